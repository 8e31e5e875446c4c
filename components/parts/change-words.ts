import { formatFixed, formatProse } from '@/lib/rules/format-figure';
import { METRES_PER, type LinearUnit } from '@/lib/rules/units';
import type { ValueChange } from '@/lib/rules/value-change';

/** A change in words, units said. */
export function changeWords(change: ValueChange, unit: LinearUnit): string {
  const words: string[] = [];
  if (change.construction !== undefined) words.push(change.construction);
  if (change.wall_m != null) words.push(`wall ${formatFixed(change.wall_m / METRES_PER[unit])} ${unit}`);
  if (change.target_mass_kg != null) words.push(`target mass ${formatProse(change.target_mass_kg)} kg`);
  if (change.density_kg_m3 != null) words.push(`density ${formatProse(change.density_kg_m3)} kg/m³`);
  if (change.material != null) words.push(change.material);
  if (change.areal_density_kg_m2 != null)
    words.push(`weight per area ${formatProse(change.areal_density_kg_m2)} kg/m²`);
  if (change.left_out !== undefined) words.push(change.left_out ? 'left out' : 'taken in');
  return words.length === 0 ? 'no mass' : words.join(', ');
}
