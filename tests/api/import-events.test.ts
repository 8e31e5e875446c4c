import { encode } from 'next-auth/jwt';
import { describe, expect, test, vi } from 'vitest';
import { GET as WATCH } from '@/app/api/v1/imports/events/route';
import { database } from '@/db/client';
import { sessionCookie } from '@/lib/auth/session-cookie';
import { config } from '@/lib/config';
import { cancelImport } from '@/lib/imports/cancel-import';
import { getImport } from '@/lib/imports/get-import';
import { notifySignOut } from '@/lib/imports/notify-import';
import { closeOpenStreams } from '@/lib/imports/open-streams';
import { removeMember } from '@/lib/shows/remove-member';
import type { ImportDetail } from '@/lib/rules/import-answer';
import { call, eachCaller, expectProblem } from '../support/api';
import { brokenObj, cubeObj } from '../support/cages';
import { createCast, type Cast, type TestUser } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles, openWith } from '../support/imports';

interface Event {
  id: string;
  kind: string;
  data: ImportDetail & { show: string };
}

const eventsIn = (text: string): Event[] => [...text.matchAll(/^id: ([\d,]+)\nevent: (\w+)\ndata: (.*)$/gm)].map(([, id, kind, data]) => ({ id, kind, data: JSON.parse(data) as Event['data'] }));
const bring = (cast: Cast, files: Record<string, string>) => importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral' });
const openOne = (cast: Cast) => openWith(cast.contextOf('td'), cast.show.code, { 'a.obj': cubeObj() }, { scheme: 'polyhedral' });
const watching = (...imports: { cast: Cast; id: string }[]) => ({ watch: imports.map(({ cast, id }) => `${cast.show.code}/${id}`).join(',') });

/** A stream that is read as it comes. `ended` resolves with all of its text. */
function follow(query: Record<string, string>, headers: Record<string, string>) {
  const heard: string[] = [];
  const url = new URL('http://127.0.0.1:3000/api/v1/imports/events');
  for (const [name, value] of Object.entries(query)) url.searchParams.set(name, value);
  const leaving = new AbortController();
  const ended = (async () => {
    const response = await WATCH(new Request(url, { headers: { host: url.host, ...headers }, signal: leaving.signal }), { params: Promise.resolve({}) });
    const reader = response.body!.pipeThrough(new TextDecoderStream()).getReader();
    for (let next = await reader.read(); !next.done; next = await reader.read()) heard.push(next.value);
    return heard.join('');
  })();
  const events = () => eventsIn(heard.join(''));
  return { ended, events, leave: () => leaving.abort(), until: (count: number) => vi.waitFor(() => expect(events().length).toBeGreaterThanOrEqual(count), { timeout: 10_000 }) };
}

const bearer = (user: TestUser) => ({ authorization: `Bearer ${user.token}` });
async function signedIn(user: TestUser): Promise<{ cookie: string }> {
  const token = await encode({ secret: config().authSecret!, token: { userId: user.id, sessionEpoch: 0 } });
  return { cookie: `${sessionCookie().name}=${token}` };
}

describe('who may follow', () => {
  eachCaller('following many', WATCH, { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 }, ['imports', 'import_files'], async (caller) => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'ox.obj': cubeObj() });
    return { query: watching({ cast, id }), token: cast.tokenOf(caller) };
  });

  test('what is not theirs is told as gone beside what is', async () => {
    const [mine, other] = [await createCast(), await createCast()];
    const [{ id }, { id: theirs }] = [await bring(mine, { 'a.obj': cubeObj() }), await bring(other, { 'b.obj': cubeObj() })];
    const answer = await call(WATCH, { query: watching({ cast: mine, id }, { cast: other, id: theirs }), token: mine.people.artist.token });
    const events = eventsIn(answer.text);
    expect(events.map((event) => [event.kind, event.data.show, event.data.id])).toEqual([
      ['gone', other.show.code, theirs],
      ['import', mine.show.code, id],
    ]);
    expect(answer.text).not.toContain('b.obj');
  });

  test.each([['nothing', ''], ['no import', 'quay'], ['a mark of letters', 'quay/1@x']])('%s to watch is refused by name', async (_what, watch) => {
    const cast = await createCast();
    expectProblem(await call(WATCH, { query: { watch }, token: cast.people.td.token }), 422, 'bad_input', 'watch');
  });
});

describe('one stream for many imports', () => {
  test('tells each import’s changes under its own name and ends with the last', async () => {
    const cast = await createCast();
    const [one, two] = [await openOne(cast), await openOne(cast)];
    const stream = follow(watching({ cast, id: one }, { cast, id: two }), bearer(cast.people.td));
    await stream.until(2);
    await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: one });
    await stream.until(3);
    await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: two });
    const events = eventsIn(await stream.ended);
    expect(events.filter((event) => event.data.state === 'cancelled').map((event) => event.data.id)).toEqual([one, two]);
  });

  test('goes on after a break from what was told of each', async () => {
    const cast = await createCast();
    const [one, two] = [await openOne(cast), await openOne(cast)];
    const query = watching({ cast, id: one }, { cast, id: two });
    const stream = follow(query, bearer(cast.people.td));
    await stream.until(2);
    stream.leave();
    const last = stream.events().at(-1)!.id;
    expect(last.split(',')).toHaveLength(2);
    // While nobody listens, both change.
    for (const id of [one, two]) await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    const again = eventsIn((await call(WATCH, { query, token: cast.people.td.token, headers: { 'last-event-id': last } })).text);
    for (const id of [one, two]) expect(again.filter((event) => event.data.id === id).flatMap((event) => event.data.files).map((file) => [file.name, file.state])).toEqual([['a.obj', 'failed']]);
  });

  test('begins at the mark that the page has', async () => {
    const cast = await createCast();
    const { id } = await bring(cast, { 'a.obj': cubeObj(), 'b.obj': brokenObj });
    // While another test's transaction is under way in the same cluster, files are told again: a mark after it is waited for.
    await vi.waitFor(
      async () => {
        const { mark } = await getImport(cast.contextOf('td'), { show: cast.show.code, import: id });
        const [event] = eventsIn((await call(WATCH, { query: { watch: `${cast.show.code}/${id}@${mark}` }, token: cast.people.td.token })).text);
        expect(event.data.state).toBe('done');
        expect(event.data.files).toEqual([]);
      },
      { timeout: 40_000 },
    );
  });
});

describe('a stream ends', () => {
  test('when its reader signs out, and does not end others’', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const [mine, other] = [follow(watching({ cast, id }), await signedIn(cast.people.td)), follow(watching({ cast, id }), await signedIn(cast.people.lead))];
    await Promise.all([mine.until(1), other.until(1)]);
    await notifySignOut(database(), cast.people.td.id);
    await mine.ended;
    await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    expect(eventsIn(await other.ended).at(-1)?.data.state).toBe('cancelled');
  });

  test('without another word when its reader leaves the show', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const stream = follow(watching({ cast, id }), bearer(cast.people.artist));
    await stream.until(1);
    await removeMember(cast.contextOf('lead'), { show: cast.show.code, email: cast.people.artist.email });
    await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    const events = eventsIn(await stream.ended);
    expect(events.at(-1)?.kind).toBe('gone');
    expect(events.some((event) => event.data.state === 'cancelled')).toBe(false);
  });

  test('when the account behind its session is disabled', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const stream = follow(watching({ cast, id }), await signedIn(cast.people.artist));
    await stream.until(1);
    await asOwner('update users set disabled_at = now() where id = $1', [cast.people.artist.id]);
    await cancelImport(cast.contextOf('td'), { show: cast.show.code, import: id });
    expect(eventsIn(await stream.ended).some((event) => event.data.state === 'cancelled')).toBe(false);
  });

  test('when the server is told to end', async () => {
    const cast = await createCast();
    const id = await openOne(cast);
    const stream = follow(watching({ cast, id }), bearer(cast.people.td));
    await stream.until(1);
    closeOpenStreams();
    expect(eventsIn(await stream.ended)).toHaveLength(1);
  });
});

test('only the person who opened an import, from a page, is noted as watching it', async () => {
  const cast = await createCast();
  const id = await openOne(cast);
  const watched = async () => (await asOwner<{ watched_at: Date | null }>('select watched_at from imports where id = $1', [id]))[0].watched_at;
  for (const headers of [bearer(cast.people.td), await signedIn(cast.people.lead)]) {
    const stream = follow(watching({ cast, id }), headers);
    await stream.until(1);
    stream.leave();
    await stream.ended;
  }
  expect(await watched()).toBeNull();
  const stream = follow(watching({ cast, id }), await signedIn(cast.people.td));
  await stream.until(1);
  stream.leave();
  await stream.ended;
  expect(await watched()).not.toBeNull();
});
