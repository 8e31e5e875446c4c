'use client';

import Link from 'next/link';
import { useRef } from 'react';
import { ProblemShape, WarningShape } from '@/components/parts/problem-counts';
import { cn } from '@/components/ui/cn';
import { Figure } from '@/components/ui/figure';
import { useElementWidth } from '@/hooks/use-element-width';
import { useVirtualRows } from '@/hooks/use-virtual-rows';
import { doubtsUnit, LOUD_REMARKS, REMARKS, type ImportFileAnswer } from '@/lib/rules/import-answer';
import { placeWords } from '@/lib/rules/import-note';
import { versionLabel, type PlannedFile } from '@/lib/rules/import-plan';
import { FilePath } from './file-path';
import { SizeFigure, standingBox } from './size-figure';

const COMPACT_BELOW = 900;
const ROW_HEIGHT = 48;
const CARD_HEIGHT = 132;
const COLUMNS = 'minmax(14rem,1.5fr) 6.5rem minmax(7rem,0.8fr) 5rem 3.5rem 4.5rem 12rem minmax(14rem,2fr)';
const HEADS = ['File', 'End', 'Asset', 'Version', 'Parts', 'Problems', 'Height, m', 'To know'];
const RIGHT = new Set(['Parts', 'Problems']);

interface ReportTableProps {
  show: string;
  upAxis: 'y' | 'z';
  files: readonly ImportFileAnswer[];
  /** Where a file's name puts it, until it has its asset. */
  planned: ReadonlyMap<string, PlannedFile>;
}

/** Every file with its end: failures with their place, problems, and what deserves a look. */
export function ReportTable({ show, upAxis, files, planned }: ReportTableProps) {
  const scroller = useRef<HTMLDivElement>(null);
  const width = useElementWidth(scroller);
  const compact = width !== null && width < COMPACT_BELOW;
  const { items, height } = useVirtualRows(scroller, () => (compact ? CARD_HEIGHT : ROW_HEIGHT), files.length, (index) => `${compact}${files[index].name}`, 36);
  return (
    <div ref={scroller} role={compact ? 'list' : 'table'} aria-label="Files of the import" aria-rowcount={compact ? undefined : files.length + 1} tabIndex={0} className="min-h-0 flex-1 overflow-auto max-md:min-h-112 max-md:shrink-0">
      {compact ? null : (
        <div role="row" className="sticky top-0 z-10 grid h-9 items-center gap-x-3 border-b border-rule bg-ground px-4 text-12 text-ink-3 md:px-6" style={{ gridTemplateColumns: COLUMNS }}>
          {HEADS.map((head) => (
            <span key={head} role="columnheader" className={RIGHT.has(head) ? 'text-right' : undefined}>
              {head}
            </span>
          ))}
        </div>
      )}
      <div role={compact ? undefined : 'rowgroup'} className="relative" style={{ height }}>
        {items.map((item) => {
          const file = files[item.index];
          const shared = { file, plan: planned.get(file.name) ?? null, show, upAxis, top: item.start };
          return compact ? <Card key={item.key} {...shared} /> : <Row key={item.key} {...shared} index={item.index} />;
        })}
      </div>
    </div>
  );
}

interface FileProps {
  file: ImportFileAnswer;
  plan: PlannedFile | null;
  show: string;
  upAxis: 'y' | 'z';
  top: number;
}

function Row({ file, plan, show, upAxis, top, index }: FileProps & { index: number }) {
  return (
    <div role="row" aria-rowindex={index + 2} className="absolute inset-x-0 grid items-center gap-x-3 border-b border-rule px-4 text-13 md:px-6" style={{ top, height: ROW_HEIGHT, gridTemplateColumns: COLUMNS }}>
      <div role="rowheader" className="min-w-0">
        <FilePath path={file.name} />
      </div>
      <div role="cell">
        <EndWords file={file} />
      </div>
      <div role="cell" className="min-w-0 truncate">
        <AssetLink file={file} plan={plan} show={show} />
      </div>
      <div role="cell">
        <VersionWords file={file} plan={plan} />
      </div>
      <div role="cell" className="text-right">{file.parts}</div>
      <div role="cell" className={cn('text-right', (file.problems ?? 0) > 0 ? 'text-wrong' : undefined)}>{file.problems}</div>
      <div role="cell">
        <Size file={file} upAxis={upAxis} />
      </div>
      <div role="cell" className="min-w-0">
        <ToKnow file={file} />
      </div>
    </div>
  );
}

function Card({ file, plan, show, upAxis, top }: FileProps) {
  return (
    <div role="listitem" className="absolute inset-x-0 flex flex-col gap-1 overflow-hidden border-b border-rule px-4 py-2 text-13" style={{ top, height: CARD_HEIGHT }}>
      <div className="flex items-center justify-between gap-3">
        <FilePath path={file.name} />
        <EndWords file={file} />
      </div>
      <div className="flex items-center justify-between gap-3">
        <p className="min-w-0 truncate">
          <AssetLink file={file} plan={plan} show={show} /> <VersionWords file={file} plan={plan} />
          {file.parts === null ? null : <span className="text-ink-2"> · {file.parts === 1 ? '1 part' : `${file.parts} parts`}</span>}
          {(file.problems ?? 0) > 0 ? <span className="text-wrong"> · {file.problems === 1 ? '1 problem' : `${file.problems} problems`}</span> : null}
        </p>
        <span className="flex items-center gap-1.5">
          <Size file={file} upAxis={upAxis} />
          {file.size_m ? <span className="text-12 text-ink-3">m high</span> : null}
        </span>
      </div>
      <ToKnow file={file} />
    </div>
  );
}

const STATE_WORDS: Record<ImportFileAnswer['state'], string> = { queued: 'waiting', reading: 'reading', measuring: 'measuring', done: 'measured', failed: 'failed' };

function EndWords({ file }: { file: ImportFileAnswer }) {
  if (file.state === 'failed') {
    return (
      <span className="inline-flex items-center gap-1.5 text-wrong">
        <ProblemShape />
        {file.error?.code === 'cancelled' ? 'cancelled' : STATE_WORDS.failed}
      </span>
    );
  }
  const word = file.remarks.includes('unchanged') ? 'unchanged' : STATE_WORDS[file.state];
  return <span className={file.state === 'done' ? 'text-ink-2' : 'text-ink-3'}>{word}</span>;
}

function AssetLink({ file, plan, show }: Pick<FileProps, 'file' | 'plan' | 'show'>) {
  const asset = file.asset ?? plan?.asset ?? null;
  if (asset === null) return null;
  if (file.state !== 'done') return <span className="text-ink-3">{asset}</span>;
  return (
    <Link className="link" href={`/shows/${show}?q=${encodeURIComponent(asset)}`}>
      {asset}
    </Link>
  );
}

/** The version it became; fainter what its name says, until then. */
function VersionWords({ file, plan }: Pick<FileProps, 'file' | 'plan'>) {
  if (file.version !== null) return <span>{file.version}</span>;
  if (plan === null || plan.version === null) return null;
  return <span className="text-ink-3">{versionLabel(plan.version, 1)}</span>;
}

function Size({ file, upAxis }: { file: ImportFileAnswer; upAxis: 'y' | 'z' }) {
  if (!file.size_m) return null;
  const wrong = file.remarks.some(doubtsUnit);
  return (
    <span className="flex items-center gap-2">
      <SizeFigure size={file.size_m} upAxis={upAxis} wrong={wrong} />
      <Figure value={standingBox(file.size_m, upAxis).height} align={{ before: 4, after: 4 }} className={wrong ? 'font-medium text-wrong' : 'text-ink-2'} />
    </span>
  );
}

/** Error with its place, or the remarks; loud ones first and marked. */
function ToKnow({ file }: { file: ImportFileAnswer }) {
  if (file.error) {
    const place = placeWords(file.error);
    const text = `${place === '' ? '' : `${place}: `}${file.error.message}`;
    return (
      <p className="line-clamp-2 text-13" title={text}>
        {place === '' ? null : <span className="font-mono text-12 text-wrong">{place} </span>}
        {file.error.message}
      </p>
    );
  }
  const remarks = file.remarks.filter((remark) => remark !== 'unchanged');
  if (remarks.length === 0) return null;
  const isLoud = remarks.some((remark) => LOUD_REMARKS.includes(remark));
  const isWrong = remarks.some(doubtsUnit);
  const text = [...remarks].sort((a, b) => Number(LOUD_REMARKS.includes(b)) - Number(LOUD_REMARKS.includes(a))).map((remark) => REMARKS[remark]).join(' ');
  return (
    <p className={cn('flex items-start gap-1.5 text-13', isWrong ? 'text-wrong' : isLoud ? 'text-ink' : 'text-ink-2')} title={text}>
      {isLoud ? <span className="mt-1"><WarningShape /></span> : null}
      <span className="line-clamp-2">{text}</span>
    </p>
  );
}
