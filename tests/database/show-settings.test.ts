import { beforeEach, describe, expect, test } from 'vitest';
import { listEventFilters } from '@/lib/history/list-event-filters';
import { listEvents } from '@/lib/history/list-events';
import { recordEvent } from '@/lib/history/record-event';
import { database } from '@/db/client';
import type { Context } from '@/lib/context';
import { editShowInput } from '@/lib/rules/inputs/edit-show';
import { listEventsInput } from '@/lib/rules/inputs/list-events';
import { editShow } from '@/lib/shows/edit-show';
import { listMembers } from '@/lib/shows/list-members';
import { rowsOf } from '../support/api';
import { CALLERS, createCast, type Caller, type Cast } from '../support/cast';
import { asOwner } from '../support/database';

const TABLES = ['shows', 'members', 'audit_events', 'audit_items'];

let cast: Cast;
beforeEach(async () => {
  cast = await createCast();
});

function contextFor(caller: Caller): Context {
  return caller === 'nobody' ? { ...cast.contextOf('admin'), actor: null } : cast.contextOf(caller);
}

const CODES: Record<Caller, string | null> = { admin: null, lead: null, td: 'forbidden', artist: 'forbidden', guest: 'not_found', outsider: 'not_found', nobody: 'not_signed_in' };

describe('changing a show', () => {
  test.each(CALLERS)('by %s', async (caller) => {
    const before = await rowsOf(...TABLES);
    const act = editShow(contextFor(caller), { show: cast.show.code, title: 'The Bell' });
    if (CODES[caller] === null) return void expect(await act).toMatchObject({ title: 'The Bell' });
    await expect(act).rejects.toMatchObject({ code: CODES[caller] });
    expect(await rowsOf(...TABLES)).toBe(before);
  });

  test('unit, axis and scheme change until the first import and never after', async () => {
    const lead = cast.contextOf('lead');
    const show = cast.show.code;
    expect(await editShow(lead, { show, linear_unit: 'm', up_axis: 'z', scheme: 'loop' })).toMatchObject({ linear_unit: 'm', up_axis: 'z', scheme: 'loop' });
    await asOwner('update shows set frozen_at = now() where id = $1', [cast.show.id]);
    const before = await rowsOf(...TABLES);
    for (const change of [{ linear_unit: 'cm' as const }, { up_axis: 'y' as const }, { scheme: 'catmull-clark' as const }]) {
      await expect(editShow(lead, { show, title: 'Never', ...change })).rejects.toMatchObject({ code: 'frozen', field: Object.keys(change)[0] });
    }
    expect(await rowsOf(...TABLES)).toBe(before);
    // Saying again what holds is no change.
    await editShow(lead, { show, linear_unit: 'm', boundary: 'edge-only' });
  });

  test('the history has what changed, before and after, and nothing where nothing did', async () => {
    const lead = cast.contextOf('lead');
    const show = cast.show.code;
    await editShow(lead, { show, title: cast.show.title, self_approval: true, name_pattern: '{asset}_v{version}' });
    await editShow(lead, { show, self_approval: true });
    const { items } = await listEvents(lead, listEventsInput.parse({ show }));
    expect(items).toHaveLength(1);
    expect(items[0]).toMatchObject({ act: 'edit-show', person: { email: cast.people.lead.email }, item_count: 2, origin: 'api' });
    expect(items[0].items).toMatchObject([
      { part: null, field: 'name_pattern', before: null, after: '{asset}_v{version}' },
      { part: null, field: 'self_approval', before: 'false', after: 'true' },
    ]);
    await editShow(lead, { show, name_pattern: '' });
    expect(await asOwner('select name_pattern from shows where id = $1', [cast.show.id])).toEqual([{ name_pattern: null }]);
  });

  test('tolerances are percentages, each with its history, and nothing else is one', async () => {
    const lead = cast.contextOf('lead');
    const show = cast.show.code;
    expect(await editShow(lead, editShowInput.parse({ show, tolerance_mass_percent: 2.5, tolerance_com_percent: 0, tolerance_moments_percent: 1 }))).toMatchObject({
      tolerance_mass_percent: 2.5, tolerance_com_percent: 0, tolerance_moments_percent: 1,
    });
    const { items } = await listEvents(lead, listEventsInput.parse({ show }));
    expect(items[0].items).toMatchObject([
      { part: null, field: 'tolerance_mass_percent', before: '0.5', after: '2.5' },
      { part: null, field: 'tolerance_com_percent', before: '0.5', after: '0' },
    ]);
    for (const wrong of [-0.1, 101, Number.NaN, Number.POSITIVE_INFINITY, '1']) {
      expect(editShowInput.safeParse({ show, tolerance_mass_percent: wrong }).error?.issues[0].path, String(wrong)).toEqual(['tolerance_mass_percent']);
    }
  });

  test('an archived show comes back and takes nothing else', async () => {
    const lead = cast.contextOf('lead');
    const show = cast.show.code;
    await editShow(lead, { show, archived: true });
    await expect(editShow(lead, { show, title: 'Later' })).rejects.toMatchObject({ code: 'frozen' });
    await expect(editShow(cast.contextOf('td'), { show, archived: false })).rejects.toMatchObject({ code: 'forbidden' });
    await expect(editShow(cast.contextOf('guest'), { show, archived: false })).rejects.toMatchObject({ code: 'not_found' });
    expect(await editShow(lead, { show, archived: false })).toMatchObject({ archived: false });
    await editShow(lead, { show, title: 'Later' });
  });

  test('a name pattern that cannot work is refused with its reason', () => {
    const wrong = editShowInput.safeParse({ show: 'x', name_pattern: '{version}' });
    expect(wrong.error?.issues[0]).toMatchObject({ path: ['name_pattern'], message: 'The pattern needs {asset}.' });
    expect(editShowInput.safeParse({ show: 'x', name_pattern: '{asset}' }).success).toBe(true);
  });
});

describe('reading a show’s people and history', () => {
  const READ: Record<Caller, string | null> = { ...CODES, td: null, artist: null };
  test.each(CALLERS)('by %s', async (caller) => {
    for (const act of [
      () => listMembers(contextFor(caller), { show: cast.show.code }),
      () => listEvents(contextFor(caller), listEventsInput.parse({ show: cast.show.code })),
      () => listEventFilters(contextFor(caller), cast.show.code),
    ]) {
      if (READ[caller] === null) await act();
      else await expect(act()).rejects.toMatchObject({ code: READ[caller] });
    }
  });

  test('members are listed leads first, with what they may see', async () => {
    const rows = await listMembers(cast.contextOf('artist'), { show: cast.show.code });
    expect(rows.map((row) => row.role)).toEqual(['lead', 'td', 'artist', 'guest']);
  });

  test('pages tell every act once, the newest first, and another show’s never', async () => {
    const other = await createCast();
    await database().transaction(async (tx) => {
      for (let i = 0; i < 120; i++) await recordEvent(tx, cast.contextOf(i % 3 === 0 ? 'lead' : 'td'), { showId: cast.show.id, act: i % 2 ? 'set-values' : 'edit-show', subject: `act ${i}` });
      await recordEvent(tx, other.contextOf('lead'), { showId: other.show.id, act: 'edit-show', subject: 'elsewhere' });
    });
    const lead = cast.contextOf('lead');
    const read = async (filter: object) => {
      const seen: string[] = [];
      let before: number | undefined;
      do {
        const page: Awaited<ReturnType<typeof listEvents>> = await listEvents(lead, listEventsInput.parse({ show: cast.show.code, ...filter, ...(before ? { before } : {}) }));
        seen.push(...page.items.map((event) => event.subject));
        before = page.next ?? undefined;
      } while (before);
      return seen;
    };
    const all = Array.from({ length: 120 }, (_, index) => `act ${119 - index}`);
    expect(await read({})).toEqual(all);
    expect(await read({ act: 'set-values' })).toEqual(all.filter((_, index) => (119 - index) % 2 === 1));
    expect(await read({ person: cast.people.lead.email.toUpperCase() })).toEqual(all.filter((_, index) => (119 - index) % 3 === 0));
    expect(await listEventFilters(lead, cast.show.code)).toEqual({
      acts: ['edit-show', 'set-values'],
      people: [cast.people.lead, cast.people.td].map(({ name, email }) => ({ name, email })),
    });
  });

  test('a part is found by its name and by its asset', async () => {
    const [asset] = await asOwner<{ id: string }>(`insert into assets (show_id, code, category) values ($1, 'tarnOx', 'creature') returning id`, [cast.show.id]);
    const [horn] = await asOwner<{ id: string }>(`insert into parts (asset_id, name) values ($1, 'horn_L') returning id`, [asset.id]);
    await database().transaction(async (tx) => {
      const items = Array.from({ length: 30 }, (_, index) => ({ partId: horn.id, field: 'target_mass_kg', before: null, after: String(index) }));
      await recordEvent(tx, cast.contextOf('td'), { showId: cast.show.id, act: 'set-values', subject: '30 parts', items });
      await recordEvent(tx, cast.contextOf('td'), { showId: cast.show.id, act: 'set-values', subject: 'no part' });
    });
    const find = async (part: string) => (await listEvents(cast.contextOf('lead'), listEventsInput.parse({ show: cast.show.code, part }))).items;
    for (const part of ['horn', 'TARNOX', 'tarnOx/horn_L']) expect((await find(part)).map((event) => event.subject)).toEqual(['30 parts']);
    expect(await find('horn%')).toEqual([]);
    const [event] = await find('horn');
    expect(event.item_count).toBe(30);
    expect(event.items.map((item) => item.after)).toEqual(Array.from({ length: 20 }, (_, index) => String(index)));
    expect(event.items[0]).toMatchObject({ part: 'tarnOx/horn_L', before: null });
  });
});
