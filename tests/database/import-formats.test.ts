import { expect, test } from 'vitest';
import { GOOD } from '../support/bad-files';
import { createCast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles } from '../support/imports';

const textOf = (name: string) => new TextDecoder().decode(GOOD.find((one) => one.name === name)!.bytes);

/** Volumes and units by the closed form: the tetrahedron of the unit axes has 1/6. */
test('every text format comes in as an asset; a show that refuses a unit or axis other than its own does, and nothing else is touched', async () => {
  const cast = await createCast({ otherSpace: 'refuse' });
  const [show] = await asOwner<{ linear_unit: string; up_axis: string }>('select linear_unit, up_axis from shows where id = $1', [cast.show.id]);
  const metres = { mm: 0.001, cm: 0.01, dm: 0.1, m: 1, in: 0.0254, ft: 0.3048 }[show.linear_unit]!;
  const usda = textOf('a.usda').replace('0.01', String(metres)).replace('upAxis = "Y"', `upAxis = "${show.up_axis.toUpperCase()}"`);
  const files = {
    'wedge_v001.obj': textOf('a.obj'),
    'peg_v001.ply': textOf('a.ply'),
    'cap_v001.stl': textOf('a.stl'),
    'fin_v001.usda': usda,
    'giant_v001.usda': usda.replace(String(metres), '12'),
    'lying_v001.usda': usda.replace(/upAxis = "."/, `upAxis = "${show.up_axis === 'y' ? 'Z' : 'Y'}"`),
    'hidden_v001.zip': textOf('a.obj'),
  };
  const done = await importFiles(cast.contextOf('td'), cast.show.code, files, { scheme: 'polyhedral', parts_by: 'whole' });
  const outcome = Object.fromEntries(done.files.map((file) => [file.name, file.error?.code ?? file.state]));
  expect(outcome).toEqual({ 'wedge_v001.obj': 'done', 'peg_v001.ply': 'done', 'cap_v001.stl': 'done', 'fin_v001.usda': 'done', 'giant_v001.usda': 'units_disagree', 'lying_v001.usda': 'axis_disagrees', 'hidden_v001.zip': 'bad_archive' });
  const volumes = await asOwner<{ asset: string; volume: number }>(
    `select a.code as asset, c.volume from geometry_components c join geometry_parts p on p.id = c.geometry_part_id
     join asset_versions v on v.record_id = p.record_id join assets a on a.id = v.asset_id where a.show_id = $1 order by a.code`,
    [cast.show.id],
  );
  expect(volumes.map((row) => row.asset)).toEqual(['cap', 'fin', 'peg', 'wedge']);
  for (const { volume } of volumes) expect(volume).toBeCloseTo(1 / 6, 14);
  const notes = await asOwner<{ asset: string; code: string }>(
    `select a.code as asset, f.code from findings f join asset_versions v on v.record_id = f.record_id join assets a on a.id = v.asset_id where a.show_id = $1 and f.code in ('triangles_only', 'scheme_differs') order by 1`,
    [cast.show.id],
  );
  // The layer asks for Loop; the import measures as is.
  expect(notes).toEqual([{ asset: 'cap', code: 'triangles_only' }, { asset: 'fin', code: 'scheme_differs' }]);
});

test('another show’s measurement of a file does not let it in where its unit is refused', async () => {
  const [centimetres, metres] = [await createCast(), await createCast({ linearUnit: 'm', otherSpace: 'refuse' })];
  const bring = async (cast: typeof metres) => (await importFiles(cast.contextOf('td'), cast.show.code, { 'fin_v001.usda': textOf('a.usda') }, { scheme: 'polyhedral' })).files[0];
  expect((await bring(centimetres)).state).toBe('done');
  expect(await bring(metres)).toMatchObject({ state: 'failed', error: { code: 'units_disagree' } });
  // Its own measurement is used again.
  expect(await bring(centimetres)).toMatchObject({ state: 'done', remarks: ['unchanged'] });
});
