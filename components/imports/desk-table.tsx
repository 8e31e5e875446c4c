'use client';

import { useRef } from 'react';
import { useElementWidth } from '@/hooks/use-element-width';
import type { DeskFile, DeskRow as Row } from '@/hooks/use-import-desk';
import { useVirtualRows } from '@/hooks/use-virtual-rows';
import { DESK_CARD_HEIGHT, DESK_COLUMNS, DESK_ROW_HEIGHT, DeskRow } from './desk-row';

const COMPACT_BELOW = 760;
const HEADS = ['File', 'Asset', 'Version', 'Category', 'Will be', 'Size', ''];

interface DeskTableProps {
  rows: readonly Row[];
  locked: boolean;
  onChange: (path: string, to: Partial<DeskFile>) => void;
  onRemove: (path: string) => void;
}

/** The chosen files with where each will go; as cards where the page is narrow. */
export function DeskTable({ rows, locked, onChange, onRemove }: DeskTableProps) {
  const scroller = useRef<HTMLDivElement>(null);
  const width = useElementWidth(scroller);
  const compact = width !== null && width < COMPACT_BELOW;
  const { items, height } = useVirtualRows(scroller, () => (compact ? DESK_CARD_HEIGHT : DESK_ROW_HEIGHT), rows.length, (index) => `${compact}${rows[index].desk.path}`, 36);
  return (
    <div ref={scroller} role={compact ? 'list' : 'table'} aria-label="Files and where they go" aria-rowcount={compact ? undefined : rows.length + 1} tabIndex={0} className="min-h-0 flex-1 overflow-auto max-md:min-h-112 max-md:shrink-0">
      <div className={compact ? undefined : 'min-w-[54rem]'}>
        {compact ? null : (
          <div role="row" className="sticky top-0 z-10 grid h-9 items-center gap-x-3 border-b border-rule bg-ground px-4 text-12 text-ink-3 md:px-6" style={{ gridTemplateColumns: DESK_COLUMNS }}>
            {HEADS.map((head, index) => (
              <span key={head || index} role="columnheader" className={head === 'Size' ? 'text-right' : head === 'Asset' || head === 'Version' || head === 'Category' ? 'px-2.5' : undefined}>
                {head || <span className="sr-only">Leave out</span>}
              </span>
            ))}
          </div>
        )}
        <div role={compact ? undefined : 'rowgroup'} className="relative" style={{ height }}>
          {items.map((item) => (
            <DeskRow key={item.key} row={rows[item.index]} top={item.start} index={item.index} compact={compact} locked={locked} onChange={onChange} onRemove={onRemove} />
          ))}
        </div>
      </div>
    </div>
  );
}
