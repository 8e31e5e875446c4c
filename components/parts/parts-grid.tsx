'use client';

import {
  useEffect,
  useId,
  useMemo,
  useRef,
  type ClipboardEvent,
  type KeyboardEvent,
  type MouseEvent,
  type ReactNode,
  type RefObject,
} from 'react';
import { useElementWidth } from '@/hooks/use-element-width';
import type { PartColumn } from '@/hooks/use-part-filters';
import { useVirtualRows } from '@/hooks/use-virtual-rows';
import type { TableNode } from '@/lib/rules/arrange-parts';
import type { RowSelection, SelectHow } from '@/lib/rules/select-rows';
import type { ShowFrame } from '@/lib/rules/show-frame';
import { GridHead, HEAD_HEIGHT } from './grid-head';
import { ASSET_HEIGHT, COMPACT_HEIGHT, GridRow, PART_HEIGHT } from './grid-row';
import { gridTemplate, shownColumns } from './part-columns';

const COMPACT_BELOW = 640;
const COMPACT_HEAD_HEIGHT = 28;

interface PartsGridProps {
  gridRef: RefObject<HTMLDivElement | null>;
  nodes: readonly TableNode[];
  frame: ShowFrame;
  selection: RowSelection;
  saving: ReadonlySet<string>;
  closed: ReadonlySet<string>;
  sort: PartColumn | null;
  down: boolean;
  /** Columns asked for; null: those that fit. */
  columns: readonly PartColumn[] | null;
  /** The row whose mass is being typed, with its editor. */
  editing: { key: string; editor: ReactNode } | null;
  onSort: (column: PartColumn) => void;
  onSelect: (key: string, how: SelectHow) => void;
  onToggleOpen: (key: string) => void;
  onEdit: (key: string) => void;
  onOpen: (key: string) => void;
  onCopy: (event: ClipboardEvent) => void;
  /** Keys that the table answers; true when it did. */
  onKey: (event: KeyboardEvent, pageRows: number) => boolean;
}

/** The rows in sight. The grid itself holds the focus and names the active row, so that rows may come and go as it scrolls. */
export function PartsGrid(props: PartsGridProps) {
  const {
    gridRef: scroller,
    nodes,
    frame,
    selection,
    saving,
    closed,
    sort,
    down,
    columns,
    editing,
    onSort,
    onSelect,
    onToggleOpen,
    onEdit,
    onOpen,
    onCopy,
    onKey,
  } = props;
  const idBase = useId();
  const width = useElementWidth(scroller);
  const compact = width !== null && width < COMPACT_BELOW;
  // Kept from one drawing to the next, or every row in sight would be drawn again at each key.
  const specs = useMemo(() => shownColumns(columns, width ?? 1440), [columns, width]);
  const template = gridTemplate(specs);
  const minWidth = compact ? undefined : specs.reduce((sum, spec) => sum + spec.width, 0);

  const { items, height, reveal, remeasure } = useVirtualRows(
    scroller,
    (index) => (compact ? COMPACT_HEIGHT : nodes[index].kind === 'asset' ? ASSET_HEIGHT : PART_HEIGHT),
    nodes.length,
    (index) => nodes[index].key,
    compact ? COMPACT_HEAD_HEIGHT : HEAD_HEIGHT,
  );
  const rowId = (key: string) => `${idBase}-${encodeURIComponent(key)}`;
  const activeIndex = selection.active === null ? -1 : nodes.findIndex((node) => node.key === selection.active);

  const shape = `${compact} ${nodes.length} ${nodes[0]?.kind}`;
  const lastShape = useRef(shape);
  useEffect(() => {
    if (lastShape.current === shape) return;
    lastShape.current = shape;
    remeasure();
  });

  const revealed = useRef<string | null>(null);
  useEffect(() => {
    if (activeIndex < 0 || revealed.current === selection.active) return;
    revealed.current = selection.active;
    reveal(activeIndex);
  });

  function keyOf(event: MouseEvent): string | null {
    return event.target instanceof Element
      ? (event.target.closest<HTMLElement>('[data-key]')?.dataset.key ?? null)
      : null;
  }

  function onClick(event: MouseEvent) {
    const key = keyOf(event);
    if (key === null || (event.target instanceof Element && event.target.closest('input'))) return;
    if (event.target instanceof Element && event.target.closest('svg.lucide-chevron-down')) return onToggleOpen(key);
    onSelect(key, event.shiftKey ? 'range' : event.metaKey || event.ctrlKey ? 'toggle' : 'only');
  }

  function onDoubleClick(event: MouseEvent) {
    const key = keyOf(event);
    if (key === null || !(event.target instanceof Element)) return;
    if (event.target.closest('[data-column="mass"], [data-column="source"]')) onEdit(key);
    else onOpen(key);
  }

  return (
    <div
      ref={scroller}
      role="treegrid"
      tabIndex={0}
      aria-label="Parts"
      aria-multiselectable
      aria-rowcount={nodes.length + 1}
      aria-colcount={compact ? undefined : specs.length}
      aria-activedescendant={activeIndex < 0 || editing !== null ? undefined : rowId(nodes[activeIndex].key)}
      onKeyDown={(event) => {
        if (onKey(event, Math.max(1, Math.floor((scroller.current?.clientHeight ?? 0) / PART_HEIGHT) - 2)))
          event.preventDefault();
      }}
      onCopy={onCopy}
      onClick={onClick}
      onDoubleClick={onDoubleClick}
      className="group/grid relative min-h-0 flex-1 overflow-auto outline-none"
    >
      <div style={{ minWidth }}>
        {compact ? (
          <div
            aria-hidden
            className="sticky top-0 z-20 flex h-7 items-center justify-between border-b border-rule bg-ground px-4 text-12 text-ink-3"
          >
            <span>Asset and part</span>
            <span>Mass, kg</span>
          </div>
        ) : (
          <GridHead specs={specs} template={template} frame={frame} sort={sort} down={down} onSort={onSort} />
        )}
        <div role="rowgroup" className="relative" style={{ height }}>
          {items.map((item) => {
            const node = nodes[item.index];
            return (
              <GridRow
                key={item.key}
                node={node}
                id={rowId(node.key)}
                index={item.index + 2}
                top={item.start}
                specs={specs}
                template={template}
                frame={frame}
                compact={compact}
                chosen={isChosen(node, selection)}
                active={selection.active === node.key}
                saving={saving.has(node.key)}
                open={!closed.has(node.key)}
                editor={editing?.key === node.key ? editing.editor : null}
              />
            );
          })}
        </div>
      </div>
    </div>
  );
}

function isChosen(node: TableNode, { chosen }: RowSelection): boolean {
  if (chosen.size === 0) return false;
  return node.kind === 'part'
    ? chosen.has(node.key)
    : node.parts.length > 0 && node.parts.every((part) => chosen.has(part.key));
}
