import { expect, test } from 'vitest';
import { POST as OPEN } from '@/app/api/v1/shows/[show]/imports/route';
import { call, expectProblem } from '../support/api';
import { cubeObj } from '../support/cages';
import { createCast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles } from '../support/imports';

/** A cube whose last face looks inwards. */
const turnedObj = cubeObj().replace('f 2 4 8 6', 'f 2 6 8 4');

test('an import turns faces only when it is asked to, and both measurements of the same bytes stand beside each other', async () => {
  const cast = await createCast();
  const td = cast.contextOf('td');
  const plain = await importFiles(td, cast.show.code, { 'prop_v001.obj': turnedObj }, { scheme: 'polyhedral' });
  expect(plain).toMatchObject({ weld: false, turn_faces: false, files: [{ state: 'done', version: 'v001', problems: 1 }] });
  const mended = await importFiles(td, cast.show.code, { 'prop_v001.obj': turnedObj }, { scheme: 'polyhedral', turn_faces: true });
  expect(mended).toMatchObject({ weld: false, turn_faces: true, files: [{ state: 'done', version: 'v001-2', problems: 0 }] });
  const again = await importFiles(td, cast.show.code, { 'prop_v001.obj': turnedObj }, { scheme: 'polyhedral', turn_faces: true });
  expect(again.files[0].remarks).toEqual(['unchanged']);
  const records = await asOwner(`select turn_faces, (select array_agg(code order by code) from findings f where f.record_id = r.id) as codes from geometry_records r order by turn_faces`);
  expect(records).toEqual([{ turn_faces: false, codes: ['flipped_face'] }, { turn_faces: true, codes: ['faces_turned'] }]);
});

test('what is neither true nor false is refused by the field’s name', async () => {
  const cast = await createCast();
  const answer = await call(OPEN, { method: 'POST', params: { show: cast.show.code }, body: { weld: 'yes' }, token: cast.people.td.token });
  expectProblem(answer, 422, 'bad_input', 'weld');
});
