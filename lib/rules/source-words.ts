import { formatProse } from './format-figure';
import type { PartRow } from './part-row';
import type { MassSource, Origin } from './states';

export const SOURCE_WORDS: Record<MassSource, string> = {
  target_mass: 'target mass',
  density: 'density',
  material: 'material',
  areal_density: 'weight per area',
};

const ORIGIN_WORDS: Record<Origin, string> = {
  hand: 'by hand',
  rule: 'by a rule',
  spreadsheet: 'from a spreadsheet',
  api: 'by the API',
  import: 'at import',
};

/** What the mass comes from, short: the material's own name, else the kind of source. Null while there is no mass. */
export function sourceWord(row: Pick<PartRow, 'mass_source' | 'material'>): string | null {
  if (row.mass_source === null) return null;
  return row.mass_source === 'material' ? (row.material ?? SOURCE_WORDS.material) : SOURCE_WORDS[row.mass_source];
}

/** What a sentence about the source is made of. */
export type SourceFields = Pick<PartRow, 'mass_source' | 'construction' | 'material' | 'target_mass_kg' | 'density_kg_m3' | 'areal_density_kg_m2'>;

/** The same with the number that was set and its unit, for a sentence. */
export function sourceSentence(row: SourceFields): string {
  switch (row.mass_source) {
    case null:
      return 'No mass yet.';
    case 'target_mass':
      return `Target mass ${formatProse(row.target_mass_kg ?? 0)} kg.`;
    case 'density':
      return `Density ${formatProse(row.density_kg_m3 ?? 0)} kg/m³.`;
    case 'areal_density':
      return `Weight per area ${formatProse(row.areal_density_kg_m2 ?? 0)} kg/m².`;
    case 'material':
      return row.density_kg_m3 === null || row.construction === 'sheet'
        ? `${row.material ?? 'Material'}, ${formatProse(row.areal_density_kg_m2 ?? 0)} kg/m².`
        : `${row.material ?? 'Material'}, ${formatProse(row.density_kg_m3)} kg/m³.`;
  }
}

/** Who set it and where from; the time is left to the screen's own clock. */
export function setByWords(row: Pick<PartRow, 'set_by' | 'set_from'>): string | null {
  if (row.set_by === null && row.set_from === null) return null;
  const who = row.set_by === null ? 'Set' : `Set by ${row.set_by}`;
  return row.set_from === null ? who : `${who}, ${ORIGIN_WORDS[row.set_from]}`;
}
