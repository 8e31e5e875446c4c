'use client';

import {
  createColumnHelper,
  createExpandedRowModel,
  createSortedRowModel,
  rowExpandingFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import { useMemo } from 'react';
import type { TableNode } from '@/lib/rules/arrange-parts';
import type { AssetTotal, PartRow } from '@/lib/rules/part-row';

const features = tableFeatures({
  rowSortingFeature,
  rowExpandingFeature,
  sortedRowModel: createSortedRowModel(),
  expandedRowModel: createExpandedRowModel(),
});
const helper = createColumnHelper<typeof features, TableNode>();

export interface OrderedColumn {
  id: string;
  /** What the column is ordered by; undefined stands last. */
  order: (of: PartRow | AssetTotal) => string | number | undefined;
}

const collator = new Intl.Collator('en', { numeric: true });

function compare(a: unknown, b: unknown): number {
  return typeof a === 'number' && typeof b === 'number' ? a - b : collator.compare(String(a), String(b));
}

const subject = (node: TableNode): PartRow | AssetTotal => (node.kind === 'asset' ? node.total : node.row);

/** Asset and part rows in the order to be shown: assets among themselves, and parts within their asset. */
export function useArrangedRows(
  nodes: readonly TableNode[],
  specs: readonly OrderedColumn[],
  order: { column: string; down: boolean } | null,
  closed: ReadonlySet<string>,
): TableNode[] {
  const columns = useMemo(
    () =>
      helper.columns(
        specs.map((spec) =>
          helper.accessor((node) => spec.order(subject(node)), {
            id: spec.id,
            sortUndefined: 'last',
            sortFn: (a, b, id) => compare(a.getValue(id), b.getValue(id)),
          }),
        ),
      ),
    [specs],
  );
  const data = useMemo(() => [...nodes], [nodes]);
  const sorting = useMemo(() => (order === null ? [] : [{ id: order.column, desc: order.down }]), [order]);
  const table = useTable({
    features,
    columns,
    data,
    getRowId: (node) => node.key,
    getSubRows: (node) => (node.kind === 'asset' && !closed.has(node.key) ? node.parts : undefined),
    state: { sorting, expanded: true },
  });
  const { rows } = table.getRowModel();
  return useMemo(() => rows.map((row) => row.original), [rows]);
}
