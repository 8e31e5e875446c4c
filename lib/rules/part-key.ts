import type { PartRow } from './part-row';

/** Name of a row within its asset. */
export function rowName(row: PartRow): string {
  return (row.row === 'body' ? row.body : row.part) ?? '';
}

/** One key for each row of a show. Asset codes hold no slash; names may. */
export function partKey(row: PartRow): string {
  return `${row.asset}/${row.row === 'part' ? '' : `${row.row}:`}${rowName(row)}`;
}

/** Key of an asset's own row. */
export function assetKey(asset: string): string {
  return `${asset}/`;
}
