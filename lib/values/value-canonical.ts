import { createHash } from 'node:crypto';
import { VALUE_FORM } from '@/lib/rules/canonical-form';
import type { ComputedValue } from './compute-value';
import type { ValueInputs } from './value-inputs';

/** The numbers of a value, each as its row has it. */
export type ValueResults = Pick<ComputedValue, 'properties' | 'densityKgPerM3' | 'arealDensityKgPerM2' | 'areaM2' | 'volumeM3' | 'numericError'>;

/**
 * The canonical form of a value: everything that it follows from, then the numbers that followed. `value_sha256` is the SHA-256
 * (lower-case hex) of its UTF-8 bytes, so that equal hashes mean equal inputs and equal numbers.
 * It is one JSON array without white space, its entries those of VALUE_FORM_ENTRIES. What is not given is `null`. Numbers are written as
 * ECMAScript writes them: the shortest decimal that reads back as the same double; a zero has no sign. Text is taken as it is, escaped
 * as `JSON.stringify` escapes it.
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
