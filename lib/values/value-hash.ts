import { createHash } from 'node:crypto';
import type { ValueInputs } from './value-inputs';

/**
 * SHA-256 (lower-case hex) over the canonical form of everything that a part's value follows from. Equal hashes mean equal inputs.
 *
 * The canonical form is the UTF-8 text of one JSON array without white space, its entries in this order:
 *  0  `"weighhouse-value-1"`, the name of this form
 *  1  `[content_sha256, scheme, boundary, triangles, creasing, parts_by, engine_version]`, the geometry record's key
 *  2  part name
 *  3  metres per file unit
 *  4  scale of the asset
 *  5  construction: `"solid"`, `"hollow"` or `"sheet"`
 *  6  wall, m
 *  7  target mass, kg
 *  8  density, kg/m³, as set on the part
 *  9  `[name, revision, density kg/m³, weight per area kg/m²]` of the material as it is now
 * 10  weight per area, kg/m², as set on the part
 * 11  variant
 * 12  cavities: `"signed"` (a component that encloses negative volume counts as a cavity)
 * 13  left out: `true` or `false`
 * What is not given is `null`. Numbers are written as ECMAScript writes them: the shortest decimal that reads back as the same double.
 * Text is taken as it is, escaped as `JSON.stringify` escapes it.
 */
export function valueHash({ record, part, metresPerUnit, scale, setting }: ValueInputs): string {
  const { material } = setting;
  const canonical = [
    'weighhouse-value-1',
    [record.contentSha256, record.scheme, record.boundary, record.triangles, record.creasing, record.partsBy, record.engineVersion],
    part,
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
    setting.leftOut,
  ];
  return createHash('sha256').update(JSON.stringify(canonical)).digest('hex');
}
