import { formatFull } from './format-figure';
import { rowName } from './part-key';
import type { PartRow } from './part-row';

const COLUMNS = [
  'mass_kg',
  'com_x_m',
  'com_y_m',
  'com_z_m',
  'ixx_kg_m2',
  'iyy_kg_m2',
  'izz_kg_m2',
  'ixy_kg_m2',
  'ixz_kg_m2',
  'iyz_kg_m2',
  'i1_kg_m2',
  'i2_kg_m2',
  'i3_kg_m2',
  'volume_m3',
] as const;

/** Rows for the clipboard: tabs between cells, SI, all digits, with a line of headers. */
export function rowsAsText(rows: readonly PartRow[]): string {
  const head = ['asset', 'part', 'version', ...COLUMNS, 'state'].join('\t');
  const lines = rows.map((row) =>
    [row.asset, rowName(row), row.version, ...COLUMNS.map((key) => formatFull(row[key])), row.state].join('\t'),
  );
  return [head, ...lines].join('\n');
}
