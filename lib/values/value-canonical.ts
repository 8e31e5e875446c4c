import { createHash } from 'node:crypto';
import type { ComputedValue } from './compute-value';
import type { ValueInputs } from './value-inputs';

/** Name of the canonical form; another form of the text has another name. */
export const VALUE_FORM = 'weighhouse-value-2';

/** The numbers of a value, each as its row has it. */
export type ValueResults = Pick<ComputedValue, 'properties' | 'densityKgPerM3' | 'arealDensityKgPerM2' | 'areaM2' | 'volumeM3' | 'numericError'>;

/**
 * The canonical form of a value: everything that it follows from, then the numbers that followed. `value_sha256` is the SHA-256
 * (lower-case hex) of its UTF-8 bytes, so that equal hashes mean equal inputs and equal numbers.
 *
 * It is one JSON array without white space, its entries in this order:
 *  0  `"weighhouse-value-2"`, the name of this form
 *  1  `[content_sha256, scheme, boundary, triangles, creasing, parts_by, engine_version]`, the geometry record's key; where the import
 *     mended the cage, `"weld"`, `"turn_faces"` or `"weld turn_faces"` comes after it
 *  2  `[asset, part]`
 *  3  metres per file unit
 *  4  scale of the asset
 *  5  construction: `"solid"`, `"hollow"` or `"sheet"`
 *  6  wall, m
 *  7  target mass, kg
 *  8  density, kg/m³, as set on the part
 *  9  `[name, revision, density kg/m³, weight per area kg/m²]` of the material
 * 10  weight per area, kg/m², as set on the part
 * 11  variant
 * 12  cavities: `"signed"` (a component that encloses negative volume counts as a cavity)
 * 13  up axis
 * 14  the row's numbers: density_kg_m3, areal_density_kg_m2, area_m2, volume_m3, mass_kg, com_x_m, com_y_m, com_z_m, ixx_kg_m2,
 *     iyy_kg_m2, izz_kg_m2, ixy_kg_m2, ixz_kg_m2, iyz_kg_m2, i1_kg_m2, i2_kg_m2, i3_kg_m2, axes_quat_w, axes_quat_x, axes_quat_y,
 *     axes_quat_z, numeric_error, and last free_axes as text (`""` where none is free)
 * What is not given is `null`. Numbers are written as ECMAScript writes them: the shortest decimal that reads back as the same double; a zero
 * has no sign.
 * Text is taken as it is, escaped as `JSON.stringify` escapes it.
 */
export function valueCanonical({ record, asset, part, metresPerUnit, scale, setting, upAxis }: ValueInputs, results: ValueResults): string {
  const { material } = setting;
  const { properties } = results;
  if (!properties) throw new Error('A value without numbers has no canonical form.');
  return JSON.stringify([
    VALUE_FORM,
    [record.contentSha256, record.scheme, record.boundary, record.triangles, record.creasing, record.partsBy, record.engineVersion, ...(record.mended ? [record.mended] : [])],
    [asset, part],
    metresPerUnit,
    scale,
    setting.construction,
    setting.wallM,
    setting.targetMassKg,
    setting.densityKgPerM3,
    material && [material.name, material.revision, material.densityKgPerM3, material.arealDensityKgPerM2],
    setting.arealDensityKgPerM2,
    setting.variant,
    'signed',
    upAxis,
    [
      results.densityKgPerM3, results.arealDensityKgPerM2, results.areaM2, results.volumeM3, properties.massKg,
      ...properties.comM, ...properties.inertiaKgM2, ...properties.principalKgM2, ...properties.quatWxyz, results.numericError, properties.freeAxes,
    ],
  ]);
}

/** SHA-256 of a canonical text, lower-case hex. */
export function valueHash(canonical: string): string {
  return createHash('sha256').update(canonical, 'utf8').digest('hex');
}
