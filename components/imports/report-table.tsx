'use client';

import { ArrowDown, ArrowUp } from 'lucide-react';
import { useEffect, useRef, type KeyboardEvent } from 'react';
import { useElementWidth } from '@/hooks/use-element-width';
import { useMeasuredRows } from '@/hooks/use-measured-rows';
import type { FileSort, ImportFileRow } from '@/lib/rules/import-answer';
import { FILE_COLUMNS } from './file-columns';
import { FileCard, FileRow } from './file-row';

const COMPACT_BELOW = 900;
const ROW_HEIGHT = 48;
const CARD_HEIGHT = 116;
const HEAD_HEIGHT = 36;
/** Rows before the end from which the next page is read. */
const READ_AHEAD = 25;

const HEADS: { word: string; sort?: 'name' | 'asset' | 'parts' | 'problems'; right?: boolean; inset?: boolean }[] = [
  { word: 'File', sort: 'name' },
  { word: 'Outcome' },
  { word: 'Asset', sort: 'asset' },
  { word: 'Version' },
  { word: 'Parts', sort: 'parts', right: true },
  { word: 'Problems', sort: 'problems', right: true },
  { word: 'Height, m', inset: true },
  { word: 'To know' },
];

interface ReportTableProps {
  show: string;
  upAxis: 'y' | 'z';
  rows: readonly ImportFileRow[];
  /** Files that filter and search let through; more than `rows` until all are read. */
  found: number;
  sort: FileSort;
  onSort: (sort: FileSort) => void;
  opened: ReadonlySet<string>;
  onToggle: (name: string) => void;
  isReading: boolean;
  /** The end of what was read comes into sight. */
  onEnd: () => void;
}

/** Every file with its end: failures with their place, problems, and what deserves a look. Rows open to all that is to know. */
export function ReportTable({ show, upAxis, rows, found, sort, onSort, opened, onToggle, isReading, onEnd }: ReportTableProps) {
  const scroller = useRef<HTMLDivElement>(null);
  const width = useElementWidth(scroller);
  const compact = width !== null && width < COMPACT_BELOW;
  const { items, height, measure } = useMeasuredRows(scroller, { count: rows.length, likely: compact ? CARD_HEIGHT : ROW_HEIGHT, keyOf: (index) => `${compact}${rows[index].name}`, headHeight: HEAD_HEIGHT });
  const isNearEnd = rows.length < found && (items.at(-1)?.index ?? 0) >= rows.length - READ_AHEAD;
  useEffect(() => {
    if (isNearEnd) onEnd();
  }, [isNearEnd, onEnd]);
  return (
    <div
      ref={scroller}
      role={compact ? 'list' : 'table'}
      aria-label="Files of the import"
      aria-rowcount={compact ? undefined : found + 1}
      aria-busy={isReading}
      tabIndex={0}
      onKeyDown={moveAmongRows}
      className="min-h-0 flex-1 overflow-auto border-t border-rule max-md:min-h-112 max-md:shrink-0"
    >
      {compact ? null : (
        <div role="row" className="sticky top-0 z-10 grid h-9 items-center gap-x-3 border-b border-rule bg-ground px-4 text-12 text-ink-3 md:px-6" style={{ gridTemplateColumns: FILE_COLUMNS }}>
          <span aria-hidden />
          {HEADS.map((head) => (
            <Head key={head.word} {...head} now={sort} onSort={onSort} />
          ))}
        </div>
      )}
      <div role={compact ? undefined : 'rowgroup'} className="relative" style={{ height }}>
        {items.map((item) => {
          const file = rows[item.index];
          const shared = { file, show, upAxis, isOpen: opened.has(file.name), onToggle: () => onToggle(file.name), top: item.start, index: item.index, measure };
          return compact ? <FileCard key={item.key} {...shared} /> : <FileRow key={item.key} {...shared} />;
        })}
      </div>
      {rows.length < found ? <p className="px-4 py-3 text-13 text-ink-3 md:px-6">{`${rows.length.toLocaleString('en')} of ${found.toLocaleString('en')} read`}</p> : null}
    </div>
  );
}

function Head({ word, sort, right, inset, now, onSort }: (typeof HEADS)[number] & { now: FileSort; onSort: (sort: FileSort) => void }) {
  if (sort === undefined) {
    return (
      <span role="columnheader" className={inset ? 'pl-4' : undefined}>
        {word}
      </span>
    );
  }
  const isUp = now === sort;
  const isDown = now === `-${sort}`;
  // Counts are wanted from the largest; a third press goes back to what needs somebody first.
  const order: FileSort[] = sort === 'parts' || sort === 'problems' ? [`-${sort}`, sort, 'needs'] : [sort, `-${sort}`, 'needs'];
  const next = order[(order.indexOf(now) + 1) % order.length];
  return (
    <span role="columnheader" aria-sort={isUp ? 'ascending' : isDown ? 'descending' : 'none'} className={right ? 'text-right' : undefined}>
      <button type="button" onClick={() => onSort(next)} className={`inline-flex items-center gap-1 hover:text-ink ${isUp || isDown ? 'text-ink' : ''}`}>
        {word}
        {isUp ? <ArrowUp aria-hidden className="size-3" /> : isDown ? <ArrowDown aria-hidden className="size-3" /> : null}
      </button>
    </span>
  );
}

/** Arrow keys go from one row's opener to the next. */
function moveAmongRows(event: KeyboardEvent<HTMLDivElement>): void {
  if (event.key !== 'ArrowDown' && event.key !== 'ArrowUp') return;
  if (!(event.target instanceof HTMLElement) || !event.target.hasAttribute('data-opener')) return;
  const openers = [...event.currentTarget.querySelectorAll<HTMLElement>('[data-opener]')].sort((a, b) => Number(a.dataset.opener) - Number(b.dataset.opener));
  const next = openers[openers.indexOf(event.target) + (event.key === 'ArrowDown' ? 1 : -1)];
  if (next === undefined) return;
  event.preventDefault();
  next.focus();
}
