'use client';

import { useRef } from 'react';
import { useElementWidth } from '@/hooks/use-element-width';
import { Checkbox } from '@/components/ui/checkbox';
import type { DeskRow as Row } from '@/hooks/use-import-desk';
import { useVirtualRows } from '@/hooks/use-virtual-rows';
import { DESK_CARD_HEIGHT, DESK_COLUMNS, DESK_ROW_HEIGHT, DeskRow, type DeskRowProps } from './desk-row';

const COMPACT_BELOW = 760;
const HEADS = ['File', 'Asset', 'Version', 'Category', 'Will be', 'Size', ''];

interface DeskTableProps extends Pick<DeskRowProps, 'locked' | 'onChoose' | 'onChange' | 'onRemove'> {
  rows: readonly Row[];
  chosen: ReadonlySet<string>;
  onChooseAll: (chosen: boolean) => void;
}

/** The dropped files with where each will go; as cards where the page is narrow. */
export function DeskTable({ rows, locked, chosen, onChoose, onChooseAll, onChange, onRemove }: DeskTableProps) {
  const scroller = useRef<HTMLDivElement>(null);
  const width = useElementWidth(scroller);
  const compact = width !== null && width < COMPACT_BELOW;
  const { items, height } = useVirtualRows(scroller, () => (compact ? DESK_CARD_HEIGHT : DESK_ROW_HEIGHT), rows.length, (index) => `${compact}${rows[index].path}`, 36);
  const count = rows.reduce((sum, row) => sum + (chosen.has(row.path) ? 1 : 0), 0);
  const all = (
    <Checkbox
      aria-label={`Choose all ${rows.length.toLocaleString('en')} files shown`}
      checked={count === 0 ? false : count === rows.length ? true : 'indeterminate'}
      disabled={locked || rows.length === 0}
      onCheckedChange={() => onChooseAll(count < rows.length)}
    />
  );
  return (
    <div ref={scroller} role={compact ? 'list' : 'table'} aria-label="Files and where they go" aria-rowcount={compact ? undefined : rows.length + 1} tabIndex={0} className="min-h-0 flex-1 overflow-auto max-md:min-h-112 max-md:shrink-0">
      <div className={compact ? undefined : 'min-w-[58rem]'}>
        {compact ? (
          <div role="presentation" className="sticky top-0 z-10 flex h-9 items-center gap-3 border-b border-rule bg-ground px-4 text-12 text-ink-3">
            {all}
            Choose all
          </div>
        ) : (
          <div role="row" className="sticky top-0 z-10 grid h-9 items-center gap-x-3 border-b border-rule bg-ground px-4 text-12 text-ink-3 md:px-6" style={{ gridTemplateColumns: DESK_COLUMNS }}>
            <span role="columnheader">{all}</span>
            {HEADS.map((head, index) => (
              <span key={head || index} role="columnheader" className={head === 'Size' ? 'text-right' : head === 'Asset' || head === 'Version' || head === 'Category' ? 'px-2.5' : undefined}>
                {head || <span className="sr-only">Leave out</span>}
              </span>
            ))}
          </div>
        )}
        <div role={compact ? undefined : 'rowgroup'} className="relative" style={{ height }}>
          {items.map((item) => (
            <DeskRow
              key={item.key}
              row={rows[item.index]}
              top={item.start}
              index={item.index}
              compact={compact}
              locked={locked}
              chosen={chosen.has(rows[item.index].path)}
              onChoose={onChoose}
              onChange={onChange}
              onRemove={onRemove}
            />
          ))}
        </div>
      </div>
    </div>
  );
}
