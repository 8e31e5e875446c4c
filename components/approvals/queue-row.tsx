'use client';

import { memo, type ReactNode } from 'react';
import { RowBeam } from '@/components/beam/row-beam';
import { StateMark } from '@/components/states/state-mark';
import { Button } from '@/components/ui/button';
import { cn } from '@/components/ui/cn';
import { ENGINEERING_WIDTHS, Figure } from '@/components/ui/figure';
import type { Refusal } from '@/hooks/use-approval-acts';
import { withoutWarnings } from '@/lib/rules/approval-queue';
import type { QueueAssetNode, QueueNode, QueueValueNode } from '@/lib/rules/arrange-queue';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { CATEGORY_WORDS } from '@/lib/rules/states';
import { PeopleCell, VerdictCell, WarningsCell } from './queue-cells';

export const ASSET_ROW_HEIGHT = 40;
export const VALUE_ROW_HEIGHT = 52;
export const COMPACT_ROW_HEIGHT = 116;

/** Part, verdict, mass, balance, people, warnings, state; what does not fit gives way from the middle. */
export const QUEUE_TEMPLATE =
  'grid-cols-[minmax(9rem,13rem)_minmax(16rem,1fr)_7.5rem_4rem_8rem] lg:grid-cols-[minmax(9rem,13rem)_minmax(16rem,1fr)_7.5rem_minmax(12rem,17rem)_4.5rem_8rem] xl:grid-cols-[minmax(9rem,13rem)_minmax(16rem,1fr)_7.5rem_11.5rem_minmax(12rem,18rem)_4.5rem_8rem]';

interface QueueRowProps {
  node: QueueNode;
  id: string;
  /** Position in the whole grid, from 1; the head is row 1. */
  index: number;
  top: number;
  frame: ShowFrame;
  compact: boolean;
  chosen: boolean;
  active: boolean;
  refusal: Refusal | null;
  onApproveAsset: (node: QueueAssetNode) => void;
}

/** One row of the queue, an asset's or a value's. It answers to the grid's own handlers by its data-key. */
export const QueueGridRow = memo(function QueueGridRow(props: QueueRowProps) {
  const { node, id, index, top, frame, compact, chosen, active, refusal, onApproveAsset } = props;
  const asset = node.kind === 'asset';
  return (
    <div
      id={id}
      role="row"
      aria-rowindex={index}
      aria-level={asset ? 1 : 2}
      aria-selected={chosen}
      data-key={node.key}
      className={cn(
        'absolute inset-x-0 cursor-default border-b border-rule select-none',
        asset
          ? 'flex h-10 items-center gap-4 bg-bench px-4 md:px-6'
          : compact
            ? 'h-29 bg-ground px-4 py-2'
            : cn('grid h-13 bg-ground hover:bg-bench', QUEUE_TEMPLATE),
        chosen &&
          'bg-selected shadow-[inset_2px_0_0_var(--brass)] hover:bg-selected forced-colors:outline-2 forced-colors:-outline-offset-2',
        active && !asset && 'shadow-[inset_2px_0_0_var(--edge)]',
        active && chosen && 'shadow-[inset_2px_0_0_var(--brass)]',
        active &&
          'after:pointer-events-none after:absolute after:inset-0 after:z-2 group-focus-visible/grid:after:outline-2 group-focus-visible/grid:after:-outline-offset-2 group-focus-visible/grid:after:outline-brass',
      )}
      style={{ transform: `translateY(${top}px)` }}
    >
      {node.kind === 'asset' ? (
        <AssetCells node={node} frame={frame} onApprove={onApproveAsset} />
      ) : compact ? (
        <CompactCells node={node} refusal={refusal} />
      ) : (
        <ValueCells node={node} frame={frame} refusal={refusal} />
      )}
    </div>
  );
});

function Cell({ children, className, head = false }: { children?: ReactNode; className?: string; head?: boolean }) {
  return (
    <div role={head ? 'rowheader' : 'gridcell'} className={cn('flex min-w-0 items-center px-2.5', className)}>
      {children}
    </div>
  );
}

function ValueCells({
  node: { row, largest },
  frame,
  refusal,
}: {
  node: QueueValueNode;
  frame: ShowFrame;
  refusal: Refusal | null;
}) {
  return (
    <>
      <Cell head className="pl-8 md:pl-10">
        <PartName node={row} />
      </Cell>
      <Cell>
        <VerdictCell row={row} refusal={refusal} />
      </Cell>
      <Cell className="flex-col items-end justify-center">
        <Figure value={row.mass_kg} notation="engineering" align={ENGINEERING_WIDTHS} />
        {row.last === null || row.value_id !== null || row.last.mass_kg === row.mass_kg ? null : (
          <Figure value={row.last.mass_kg} notation="engineering" align={ENGINEERING_WIDTHS} className="text-ink-3" />
        )}
      </Cell>
      <Cell className="max-xl:hidden">
        <RowBeam of={row} unit={frame.linear_unit} largest={largest} approved={row.last?.com_m ?? null} />
      </Cell>
      <Cell className="max-lg:hidden">
        <PeopleCell row={row} />
      </Cell>
      <Cell>
        <WarningsCell row={row} />
      </Cell>
      <Cell>
        <StateMark state={row.state} />
      </Cell>
    </>
  );
}

function PartName({ node }: { node: QueueValueNode['row'] }) {
  return (
    <span className="flex min-w-0 flex-col justify-center">
      <span className="truncate text-14" title={node.part}>
        {node.part}
      </span>
      <span className="truncate text-13 text-ink-3">
        {node.shot === null ? <span className="font-mono">{node.version}</span> : <>override in {node.shot}</>}
      </span>
    </span>
  );
}

/** A value on a phone: name and mass, verdict, who asked, state. */
function CompactCells({ node: { row }, refusal }: { node: QueueValueNode; refusal: Refusal | null }) {
  return (
    <div className="flex h-full flex-col justify-between">
      <div className="flex items-start justify-between gap-3">
        <div role="rowheader" className="min-w-0">
          <span className="block truncate text-14 font-medium">{row.part}</span>
        </div>
        <div role="gridcell" className="flex shrink-0 items-center gap-3">
          <Figure value={row.mass_kg} notation="engineering" />
        </div>
      </div>
      <div role="gridcell" className="min-w-0">
        <VerdictCell row={row} refusal={refusal} />
      </div>
      <div role="gridcell" className="flex min-w-0 items-center justify-between gap-3">
        <span className="min-w-0">
          {row.request === null ? (
            <span className="block truncate text-13 text-ink-3">
              {row.shot === null ? row.version : `override in ${row.shot}`}
            </span>
          ) : (
            <PeopleCell row={row} />
          )}
        </span>
        <span className="flex shrink-0 items-center gap-3">
          <WarningsCell row={row} />
          <StateMark state={row.state} />
        </span>
      </div>
    </div>
  );
}

function AssetCells({
  node,
  frame,
  onApprove,
}: {
  node: QueueAssetNode;
  frame: ShowFrame;
  onApprove: (node: QueueAssetNode) => void;
}) {
  const clean = withoutWarnings(node.rows).length;
  const asked = node.rows.filter((row) => row.request !== null).length;
  return (
    <>
      <div role="rowheader" className="flex min-w-0 items-baseline gap-2">
        <span className="truncate text-14 font-medium">{node.asset}</span>
        <span className="text-13 text-ink-3 max-sm:hidden">{CATEGORY_WORDS[node.category]}</span>
      </div>
      <div role="gridcell" className="text-13 whitespace-nowrap text-ink-3">
        {node.rows.length.toLocaleString('en')}
        {asked === 0 ? '' : `, ${asked.toLocaleString('en')} asked for`}
      </div>
      <div role="gridcell" className="ml-auto">
        {frame.may_approve && clean > 0 ? (
          <Button size="small" tabIndex={-1} onClick={() => onApprove(node)} className="pointer-coarse:h-9">
            <span>
              Approve {clean.toLocaleString('en')}
              <span className="max-sm:sr-only"> without warnings</span>
            </span>
          </Button>
        ) : null}
      </div>
    </>
  );
}
