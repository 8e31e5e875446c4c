'use client';

import { useEffect, useId, useRef, type KeyboardEvent, type MouseEvent, type RefObject } from 'react';
import { cn } from '@/components/ui/cn';
import type { Refusal } from '@/hooks/use-approval-acts';
import { useElementWidth } from '@/hooks/use-element-width';
import { useVirtualRows } from '@/hooks/use-virtual-rows';
import type { QueueAssetNode, QueueNode } from '@/lib/rules/arrange-queue';
import { queueKey } from '@/lib/rules/approval-queue';
import type { RowSelection, SelectHow } from '@/lib/rules/select-rows';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { ASSET_ROW_HEIGHT, COMPACT_ROW_HEIGHT, QUEUE_TEMPLATE, QueueGridRow, VALUE_ROW_HEIGHT } from './queue-row';

const COMPACT_BELOW = 720;
const HEAD_HEIGHT = 36;
/** Rows from the end at which the next page is read. */
const READ_AHEAD = 40;

interface QueueGridProps {
  gridRef: RefObject<HTMLDivElement | null>;
  nodes: readonly QueueNode[];
  frame: ShowFrame;
  selection: RowSelection;
  refusals: ReadonlyMap<string, Refusal>;
  onSelect: (key: string, how: SelectHow) => void;
  onOpen: (key: string) => void;
  onApproveAsset: (node: QueueAssetNode) => void;
  /** The end of what was read comes into sight. */
  onNearEnd: () => void;
  /** Keys that the queue answers; true when it did. */
  onKey: (event: KeyboardEvent, pageRows: number) => boolean;
}

/** The rows in sight. The grid itself holds the focus and names the active row, so that rows may come and go as it scrolls. */
export function QueueGrid(props: QueueGridProps) {
  const {
    gridRef: scroller,
    nodes,
    frame,
    selection,
    refusals,
    onSelect,
    onOpen,
    onApproveAsset,
    onNearEnd,
    onKey,
  } = props;
  const idBase = useId();
  const width = useElementWidth(scroller);
  const compact = width !== null && width < COMPACT_BELOW;
  const { items, height, reveal, remeasure } = useVirtualRows(
    scroller,
    (index) => (nodes[index].kind === 'asset' ? ASSET_ROW_HEIGHT : compact ? COMPACT_ROW_HEIGHT : VALUE_ROW_HEIGHT),
    nodes.length,
    (index) => nodes[index].key,
    compact ? 0 : HEAD_HEIGHT,
  );
  const rowId = (key: string) => `${idBase}-${encodeURIComponent(key)}`;
  const activeIndex = selection.active === null ? -1 : nodes.findIndex((node) => node.key === selection.active);

  const shape = `${compact} ${nodes.map((node) => node.kind[0]).join('')}`;
  const lastShape = useRef(shape);
  useEffect(() => {
    if (lastShape.current === shape) return;
    lastShape.current = shape;
    remeasure();
  });

  // The queue is there to be worked by keyboard: it takes the focus at first, unless something of the page has it.
  useEffect(() => {
    if (document.activeElement === document.body) scroller.current?.focus({ preventScroll: true });
  }, [scroller]);

  const revealed = useRef<string | null>(null);
  useEffect(() => {
    if (activeIndex < 0 || revealed.current === selection.active) return;
    revealed.current = selection.active;
    reveal(activeIndex);
  });

  const lastSeen = items.at(-1)?.index ?? 0;
  useEffect(() => {
    if (nodes.length > 0 && lastSeen >= nodes.length - READ_AHEAD) onNearEnd();
  }, [lastSeen, nodes.length, onNearEnd]);

  const keyOf = (event: MouseEvent): string | null =>
    event.target instanceof Element && !event.target.closest('button')
      ? (event.target.closest<HTMLElement>('[data-key]')?.dataset.key ?? null)
      : null;

  return (
    <div
      ref={scroller}
      role="treegrid"
      tabIndex={0}
      aria-label="Approvals"
      aria-multiselectable
      aria-rowcount={nodes.length + 1}
      aria-activedescendant={activeIndex < 0 ? undefined : rowId(nodes[activeIndex].key)}
      onKeyDown={(event) => {
        if (event.target instanceof Element && event.target.closest('button')) return;
        if (onKey(event, Math.max(1, Math.floor((scroller.current?.clientHeight ?? 0) / VALUE_ROW_HEIGHT) - 1)))
          event.preventDefault();
      }}
      onClick={(event) => {
        const key = keyOf(event);
        if (key !== null) onSelect(key, event.shiftKey ? 'range' : event.metaKey || event.ctrlKey ? 'toggle' : 'only');
      }}
      onDoubleClick={(event) => {
        const key = keyOf(event);
        if (key !== null) onOpen(key);
      }}
      className="group/grid relative min-h-0 flex-1 overflow-auto outline-none"
    >
      {compact ? null : <Head />}
      <div role="rowgroup" className="relative" style={{ height }}>
        {items.map((item) => {
          const node = nodes[item.index];
          return (
            <QueueGridRow
              key={item.key}
              node={node}
              id={rowId(node.key)}
              index={item.index + 2}
              top={item.start}
              frame={frame}
              compact={compact}
              chosen={
                node.kind === 'asset'
                  ? node.rows.every((row) => selection.chosen.has(queueKey(row)))
                  : selection.chosen.has(node.key)
              }
              active={selection.active === node.key}
              refusal={refusals.get(node.key) ?? null}
              onApproveAsset={onApproveAsset}
            />
          );
        })}
      </div>
    </div>
  );
}

const HEADS: readonly (readonly [label: string, className: string])[] = [
  ['Part', 'pl-8 md:pl-10'],
  ['Against the last approval', ''],
  ['Mass, kg', 'justify-end pr-10'],
  ['Balance', 'max-xl:hidden'],
  ['Asked and set', 'max-lg:hidden'],
  ['Warnings', ''],
  ['State', ''],
];

function Head() {
  return (
    <div
      role="row"
      aria-rowindex={1}
      className={cn('sticky top-0 z-20 grid h-9 border-b border-rule bg-ground', QUEUE_TEMPLATE)}
    >
      {HEADS.map(([label, className]) => (
        <div
          key={label}
          role="columnheader"
          className={cn('flex min-w-0 items-center px-2.5 text-12 text-ink-3', className)}
        >
          <span className="truncate">{label}</span>
        </div>
      ))}
    </div>
  );
}
