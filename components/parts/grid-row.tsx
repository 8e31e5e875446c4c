'use client';

import { memo, type ReactNode } from 'react';
import { StateMark } from '@/components/states/state-mark';
import { RowBeam } from '@/components/beam/row-beam';
import { cn } from '@/components/ui/cn';
import { Figure } from '@/components/ui/figure';
import type { TableNode } from '@/lib/rules/arrange-parts';
import type { ShowFrame } from '@/lib/rules/show-frame';
import type { ColumnSpec } from './part-columns';
import { AssetName, PartName } from './name-cell';
import { ProblemCounts } from './problem-counts';

export const PART_HEIGHT = 32;
export const ASSET_HEIGHT = 38;
export const COMPACT_HEIGHT = 66;

interface GridRowProps {
  node: TableNode;
  id: string;
  /** Position in the whole table, from 1; the head is row 1. */
  index: number;
  top: number;
  specs: readonly ColumnSpec[];
  template: string;
  frame: ShowFrame;
  compact: boolean;
  chosen: boolean;
  active: boolean;
  saving: boolean;
  open: boolean;
  /** The editor in place of the mass. */
  editor: ReactNode;
}

/** One row of the table, an asset's or a part's. It answers to the grid's own handlers by its data-key. */
export const GridRow = memo(function GridRow(props: GridRowProps) {
  const { node, id, index, top, specs, template, frame, compact, chosen, active, saving, open, editor } = props;
  const asset = node.kind === 'asset';
  return (
    <div
      id={id}
      role="row"
      aria-rowindex={index}
      aria-level={asset ? 1 : 2}
      aria-selected={chosen}
      aria-busy={saving || undefined}
      aria-expanded={asset ? open : undefined}
      data-key={node.key}
      data-active={active || undefined}
      className={cn(
        'group absolute inset-x-0 cursor-default border-b border-rule select-none',
        compact ? 'h-16.5 px-4 py-1.5' : asset ? 'grid h-9.5' : 'grid h-8',
        asset ? 'bg-bench' : 'bg-ground hover:bg-bench',
        chosen &&
          'bg-selected shadow-[inset_2px_0_0_var(--brass)] hover:bg-selected forced-colors:outline-2 forced-colors:-outline-offset-2',
        active &&
          'after:pointer-events-none after:absolute after:inset-0 after:z-2 group-focus-visible/grid:after:outline-2 group-focus-visible/grid:after:-outline-offset-2 group-focus-visible/grid:after:outline-brass',
        saving && 'opacity-60',
        editor !== null && 'z-10',
      )}
      style={{ transform: `translateY(${top}px)`, gridTemplateColumns: compact ? undefined : template }}
    >
      {compact ? (
        <CompactCells node={node} frame={frame} editor={editor} />
      ) : (
        specs.map((spec) => <Cell key={spec.id} spec={spec} node={node} frame={frame} editor={editor} />)
      )}
    </div>
  );
});

function Cell({
  spec,
  node,
  frame,
  editor,
}: {
  spec: ColumnSpec;
  node: TableNode;
  frame: ShowFrame;
  editor: ReactNode;
}) {
  const editing = spec.id === 'mass' && editor !== null;
  return (
    <div
      role={spec.id === 'name' ? 'rowheader' : 'gridcell'}
      data-column={spec.id}
      className={cn(
        'relative flex min-w-0 items-center px-2',
        spec.id === 'name' &&
          'sticky left-0 z-1 bg-inherit pl-3 group-aria-selected:shadow-[inset_2px_0_0_var(--brass)]',
        spec.figures && 'justify-end',
      )}
    >
      {editing ? editor : node.kind === 'asset' ? spec.asset(node, frame) : spec.part(node, frame)}
    </div>
  );
}

/** A row on a phone: two lines, name and mass above, state and beam below. */
function CompactCells({ node, frame, editor }: { node: TableNode; frame: ShowFrame; editor: ReactNode }) {
  const of = node.kind === 'asset' ? node.total : node.row;
  return (
    <>
      <div className="relative flex items-center justify-between gap-3" data-column="mass">
        <div role="rowheader" className="min-w-0">
          {node.kind === 'asset' ? <AssetName node={node} /> : <PartName node={node} />}
        </div>
        <div role="gridcell" className="shrink-0">
          {editor ?? (
            <Figure
              value={of.mass_kg}
              notation="engineering"
              className={node.kind === 'asset' ? 'font-medium' : undefined}
            />
          )}
        </div>
      </div>
      <div role="gridcell" className="flex h-7 items-center justify-between gap-3 pl-4">
        <span className="flex items-center gap-3">
          <StateMark state={of.state} />
          {node.kind === 'part' ? <ProblemCounts findings={node.row.problems} /> : null}
        </span>
        <RowBeam
          of={of}
          unit={frame.linear_unit}
          {...(node.kind === 'part' ? { largest: node.largest, partner: node.partner } : {})}
        />
      </div>
    </>
  );
}
