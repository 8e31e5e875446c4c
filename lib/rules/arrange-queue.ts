import { queueKey, type QueueRow } from './approval-queue';
import { longestAxis } from './beam-geometry';
import type { SelectableRow } from './select-rows';
import type { Category } from './states';

/** An asset over its values in the queue. */
export interface QueueAssetNode {
  kind: 'asset';
  key: string;
  asset: string;
  category: Category;
  rows: QueueRow[];
}

export interface QueueValueNode {
  kind: 'value';
  key: string;
  row: QueueRow;
  /** Longest box edge among the asset's values here, m. */
  largest: number;
}

export type QueueNode = QueueAssetNode | QueueValueNode;

/** The values under their assets, in the order given: values of one asset stand together there. */
export function arrangeQueue(rows: readonly QueueRow[]): QueueNode[] {
  const assets = new Map<string, QueueRow[]>();
  for (const row of rows) {
    const list = assets.get(row.asset);
    if (list) list.push(row);
    else assets.set(row.asset, [row]);
  }
  return [...assets].flatMap(([asset, values]): QueueNode[] => {
    const largest = Math.max(0, ...values.map((row) => (row.bounds_m === null ? 0 : longestAxis(row.bounds_m).extent)));
    return [
      { kind: 'asset', key: `${asset}/`, asset, category: values[0].category, rows: values },
      ...values.map((row): QueueValueNode => ({ kind: 'value', key: queueKey(row), row, largest })),
    ];
  });
}

/** The nodes as the selection sees them: choosing an asset chooses its values. */
export function selectableNodes(nodes: readonly QueueNode[]): SelectableRow[] {
  return nodes.map((node) => ({ key: node.key, parts: node.kind === 'asset' ? node.rows.map(queueKey) : [node.key] }));
}

/** Where the keyboard stands once the acted values have left: the next value that stays, else the one before; null for none. */
export function keyAfter(nodes: readonly QueueNode[], active: string | null, acted: ReadonlySet<string>): string | null {
  const here = Math.max(0, nodes.findIndex((node) => node.key === active));
  const stays = (node: QueueNode): boolean => node.kind === 'value' && !acted.has(node.key);
  return (nodes.slice(here).find(stays) ?? nodes.slice(0, here).findLast(stays))?.key ?? null;
}
