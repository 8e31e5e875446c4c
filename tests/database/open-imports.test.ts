import { expect, test } from 'vitest';
import { cancelImport } from '@/lib/imports/cancel-import';
import { getImportPreparation } from '@/lib/imports/get-import-preparation';
import { submitImport } from '@/lib/imports/submit-import';
import { cubeObj } from '../support/cages';
import { createCast, type Cast, type Person } from '../support/cast';
import { openWith } from '../support/imports';

const openOf = async (cast: Cast, person: Person) => (await getImportPreparation(cast.contextOf(person), { show: cast.show.code })).open;

test('a person is told of the imports that he left open, and of nobody else’s', async () => {
  const cast = await createCast();
  const show = cast.show.code;
  const empty = await openWith(cast.contextOf('td'), show, {});
  const begun = await openWith(cast.contextOf('td'), show, { 'a_v001.obj': cubeObj({ size: 1 }), 'b_v001.obj': cubeObj({ size: 2 }) }, { name_pattern: null });
  await openWith(cast.contextOf('lead'), show, { 'c_v001.obj': cubeObj({ size: 3 }) });

  const mine = await openOf(cast, 'td');
  expect(mine.map(({ id }) => id)).toEqual([begun, empty]);
  expect([...mine[0].names].sort()).toEqual(['a_v001.obj', 'b_v001.obj']);
  expect(mine[1].names).toEqual([]);
  // The built-in rule asked for is another choice than that of the show.
  expect(mine.map(({ name_pattern }) => name_pattern)).toEqual(['', null]);
  expect(mine.every(({ standard }) => standard)).toBe(true);
});

test('what was submitted or cancelled is not unfinished; what is measured in ways that the page does not offer is no standard', async () => {
  const cast = await createCast();
  const show = cast.show.code;
  const context = cast.contextOf('td');
  const submitted = await openWith(context, show, { 'a_v001.obj': cubeObj({ size: 1 }) });
  await submitImport(context, { show, import: submitted });
  const cancelled = await openWith(context, show, { 'a_v001.obj': cubeObj({ size: 1 }) });
  await cancelImport(context, { show, import: cancelled });
  const other = await openWith(context, show, {}, { triangles: 'smooth' });
  expect((await openOf(cast, 'td')).map(({ id, standard }) => ({ id, standard }))).toEqual([{ id: other, standard: false }]);
});
