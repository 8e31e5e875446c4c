import { longestAxis } from './beam-geometry';
import { mirrorName } from './mirror-name';
import { assetKey, partKey, rowName } from './part-key';
import type { AssetTotal, PartRow } from './part-row';
import type { Category, RowState } from './states';

/** A part of the table with what its beam needs of its neighbours. */
export interface PartNode {
  kind: 'part';
  key: string;
  row: PartRow;
  /** Longest box edge among the asset's parts, metres. */
  largest: number;
  /** The same part of the other side. */
  partner: PartRow | null;
}

export interface AssetNode {
  kind: 'asset';
  key: string;
  total: AssetTotal;
  /** Parts of the asset that the filters leave, in name order. */
  parts: PartNode[];
}

export type TableNode = AssetNode | PartNode;

export interface PartFilters {
  text: string;
  states: readonly RowState[];
  category: Category | null;
}

/** Every word of the text occurs in asset, part, material, joint or outside id; states and category fit. */
export function passes(row: PartRow, filters: PartFilters): boolean {
  if (filters.states.length > 0 && !filters.states.includes(row.state)) return false;
  if (filters.category !== null && row.category !== filters.category) return false;
  const words = filters.text.toLowerCase().split(/\s+/).filter(Boolean);
  if (words.length === 0) return true;
  const haystack = [row.asset, rowName(row), row.material, row.joint, row.outside_id, row.version]
    .join('\n')
    .toLowerCase();
  return words.every((word) => haystack.includes(word));
}

/** Ties each part to its asset's size and to its mirror partner; the order of `rows` is kept. */
export function partNodes(rows: readonly PartRow[]): PartNode[] {
  const largest = new Map<string, number>();
  const byName = new Map<string, PartRow>();
  for (const row of rows) {
    byName.set(`${row.asset}/${rowName(row)}`, row);
    if (row.bounds_m === null) continue;
    const { extent } = longestAxis(row.bounds_m);
    largest.set(row.asset, Math.max(largest.get(row.asset) ?? 0, extent));
  }
  return rows.map((row) => {
    const other = mirrorName(rowName(row));
    return {
      kind: 'part',
      key: partKey(row),
      row,
      largest: largest.get(row.asset) ?? 0,
      partner: (other === null ? null : byName.get(`${row.asset}/${other}`)) ?? null,
    };
  });
}

/** Groups parts under their assets; an asset whose parts are all filtered away is left out. */
export function groupByAsset(nodes: readonly PartNode[], totals: readonly AssetTotal[]): AssetNode[] {
  const groups = new Map<string, PartNode[]>();
  for (const node of nodes) {
    const group = groups.get(node.row.asset);
    if (group === undefined) groups.set(node.row.asset, [node]);
    else group.push(node);
  }
  const byAsset = new Map(totals.map((total) => [total.asset, total]));
  return [...groups].flatMap(([asset, parts]) => {
    const total = byAsset.get(asset);
    return total === undefined ? [] : [{ kind: 'asset', key: assetKey(asset), total, parts }];
  });
}
