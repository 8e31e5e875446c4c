import type { MassEntry } from './parse-mass-entry';
import type { PartRow } from './part-row';
import { changeOf, shareByVolume, type ValueChange } from './value-change';

/**
 * What a typed entry sets on each of the rows, in their order. A target mass typed on an asset's row is the mass of all its parts
 * together, shared by volume; null where a part has no volume to share by.
 */
export function entryChanges(entry: MassEntry, rows: readonly PartRow[], together: boolean): ValueChange[] | null {
  if (!together || entry.kind !== 'target_mass') return rows.map(() => changeOf(entry));
  return shareByVolume(rows, entry.massKg)?.map((share) => ({ target_mass_kg: share })) ?? null;
}
