import { describe, expect, test } from 'vitest';
import { GET as list, POST as decide } from '@/app/api/v1/shows/[show]/part-renames/route';
import { call, eachCaller, expectProblem, type StatusOfCaller } from '../support/api';
import { createCrateShow } from '../support/crate-show';
import { boxPart, putCage } from '../support/put-cage';
import type { Cast } from '../support/cast';

const TABLES = ['parts', 'part_renames', 'part_current', 'value_setters', 'audit_events', 'audit_items', 'shows'];
const readers: StatusOfCaller = { admin: 200, lead: 200, td: 200, artist: 200, guest: 404, outsider: 404, nobody: 401 };
const deciders: StatusOfCaller = { admin: 201, lead: 201, td: 201, artist: 403, guest: 404, outsider: 404, nobody: 401 };

async function renamedCrate(): Promise<Cast> {
  const cast = await createCrateShow();
  await putCage(cast.show, cast.people.td, 'crate', [boxPart('hull', [0, 0, 0], [2, 3, 4]), boxPart('lid', [10, 0, 0], [11, 1, 1])]);
  return cast;
}
const item = { asset: 'crate', version: 'v002', part: 'body', becomes: 'hull', decision: 'confirmed' };

describe('who may', () => {
  eachCaller('list renames', list, readers, TABLES, async (caller) => {
    const cast = await renamedCrate();
    return { params: { show: cast.show.code }, query: { asset: 'crate' }, token: cast.tokenOf(caller) };
  });

  eachCaller('confirm a rename', decide, deciders, TABLES, async (caller) => {
    const cast = await renamedCrate();
    return { params: { show: cast.show.code }, body: { items: [item] }, token: cast.tokenOf(caller) };
  });

  eachCaller('refuse a rename', decide, deciders, TABLES, async (caller) => {
    const cast = await renamedCrate();
    return { params: { show: cast.show.code }, body: { items: [{ ...item, decision: 'refused' }] }, token: cast.tokenOf(caller) };
  });
});

test('all or nothing, with the failing items listed', async () => {
  const cast = await renamedCrate();
  const asked = { params: { show: cast.show.code }, token: cast.tokenOf('td') };
  const failed = await call(decide, { ...asked, body: { items: [item, { ...item, part: 'nothing', becomes: 'lid' }] } });
  const problem = expectProblem(failed, 409, 'conflict');
  expect(problem.errors).toMatchObject([{ index: 1, code: 'conflict' }]);
  const listed = await call(list, { ...asked, query: { asset: 'crate' } });
  expect(listed.json).toMatchObject({ items: [{ proposals: [{ part: 'body', becomes: 'hull', fit: 'place' }] }] });
});

test('what is no rename is refused with a sentence', async () => {
  const cast = await renamedCrate();
  const asked = { params: { show: cast.show.code }, token: cast.tokenOf('td') };
  expectProblem(await call(decide, { ...asked, body: { items: [{ ...item, decision: 'maybe' }] } }), 422, 'bad_input', 'items.0.decision');
  expectProblem(await call(decide, { ...asked, body: { items: [] } }), 422, 'bad_input', 'items');
  expectProblem(await call(list, { ...asked, query: { import: 'none' } }), 422, 'bad_input', 'import');
});
