import { beforeAll, describe, expect, test } from 'vitest';
import { database } from '@/db/client';
import { refreshAssetValues } from '@/lib/values/refresh-asset-values';
import { setValues } from '@/lib/settings/set-values';
import { createCast, type Cast } from '../support/cast';
import { asApplication, asOwner } from '../support/database';
import { boxPart, putCage } from '../support/put-cage';

const POSITIVE = ['scale', 'density_kg_m3', 'areal_density_kg_m2', 'wall_m', 'target_mass_kg', 'volume_m3', 'mass_kg', 'i3_kg_m2'];
const NOT_NEGATIVE = ['area_m2', 'numeric_error', 'i1_kg_m2', 'i2_kg_m2'];
const FINITE = ['com_x_m', 'com_y_m', 'com_z_m', 'ixx_kg_m2', 'iyy_kg_m2', 'izz_kg_m2', 'ixy_kg_m2', 'ixz_kg_m2', 'iyz_kg_m2', 'axes_quat_w', 'axes_quat_x', 'axes_quat_y', 'axes_quat_z', 'cage_volume_m3'];
const NO_NUMBERS = ['NaN', 'Infinity', '-Infinity'];

let cast: Cast;
let assetId: string;

beforeAll(async () => {
  cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  assetId = await putCage(cast.show, cast.people.td, 'crate', [boxPart('body', [0, 0, 0], [2, 3, 4]), boxPart('lid', [9, 0, 0], [10, 1, 1])]);
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', part: 'body', revision: 1, density_kg_m3: 700 }] });
});

/** As the application, so that code which skipped its checks would meet the database's. */
const put = (column: string, value: string) => asApplication(`update part_current set ${column} = $1 where show_id = $2 and part = 'body'`, [value, cast.show.id]);

describe('the row of a value', () => {
  test.each([
    ...[...POSITIVE, ...NOT_NEGATIVE, ...FINITE].flatMap((column) => NO_NUMBERS.map((value) => [column, value])),
    ...POSITIVE.flatMap((column) => [[column, '0'], [column, '-1']]),
    ...NOT_NEGATIVE.map((column) => [column, '-1e-300']),
    ['bounds_m', '{0,0,0,1,1}'],
    ['bounds_m', '{0,0,0,1,1,NaN}'],
    ['i2_kg_m2', '1e300'],
    ['axes_quat_w', '-0.5'],
    ['axes_quat_x', '2'],
    ['free_axes', '13'],
    ['state', 'heavy'],
    ['state', 'unset'],
    ['construction', 'liquid'],
    ['row', 'shot'],
  ])('refuses %s = %s', async (column, value) => {
    await expect(put(column, value)).rejects.toThrow(/violates check constraint/);
  });

  test('has all numbers of a mass or none', async () => {
    await expect(asApplication(`update part_current set mass_kg = null where show_id = $1 and part = 'body'`, [cast.show.id])).rejects.toThrow(/part_current_(all_or_none|state_fits)/);
    await expect(asApplication(`update part_current set value_sha256 = null where show_id = $1 and part = 'body'`, [cast.show.id])).rejects.toThrow(/part_current_all_or_none/);
    await expect(asApplication(`update part_current set state = 'measured' where show_id = $1 and part = 'lid'`, [cast.show.id])).rejects.toThrow(/part_current_state_fits/);
  });
});

describe('a setting', () => {
  const columns = ['target_mass_kg', 'density_kg_m3', 'areal_density_kg_m2', 'wall_m'];
  test.each(columns.flatMap((column) => [...NO_NUMBERS, '0', '-1'].map((value) => [column, value])))('refuses %s = %s', async (column, value) => {
    const insert = `insert into settings (part_id, ${column}, set_by, set_from) select part_id, $1, $2, 'api' from part_current where show_id = $3 limit 1`;
    await expect(asApplication(insert, [value, cast.people.td.id, cast.show.id])).rejects.toThrow(/violates check constraint/);
  });

  test('is never changed or removed by the application', async () => {
    for (const statement of ['update settings set density_kg_m3 = 1', 'delete from settings', 'update receipts set rows = 1', 'delete from receipts', 'update geometry_components set volume = 1', 'delete from audit_items']) {
      await expect(asApplication(statement)).rejects.toThrow(/permission denied/);
    }
  });
});

test('what cannot be stored becomes a finding and not a number', async () => {
  // A density that overflows the mass, and one that lets the moments vanish below the smallest double.
  for (const [revision, density] of [[2, 1e308], [3, 1e-323]] as const) {
    const { items } = await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', part: 'body', revision, density_kg_m3: density }] });
    expect(items[0]).toMatchObject({ state: 'blocked', mass_kg: null, i3_kg_m2: null, value_sha256: null });
    expect(items[0].problems.filter((one) => one.severity === 'problem').map((one) => one.code)).toEqual(['value_check_failed']);
  }
});

test('refreshing again changes nothing', async () => {
  const rows = () => asOwner<{ row: string }>('select to_jsonb(c)::text as row from part_current c where asset_id = $1 order by 1', [assetId]);
  const before = await rows();
  const changes = await database().transaction((tx) => refreshAssetValues(tx, { assetId, importedBy: cast.people.td.id }));
  expect(changes).toEqual({ written: 0, removed: 0 });
  expect(await rows()).toEqual(before);
});
