import { ProblemCounts } from '@/components/parts/problem-counts';
import { Moment } from '@/components/ui/moment';
import { cn } from '@/components/ui/cn';
import type { Refusal } from '@/hooks/use-approval-acts';
import { verdictSentence, whyNotApprovable, type QueueRow } from '@/lib/rules/approval-queue';
import { formatProse } from '@/lib/rules/format-figure';
import { setByWords } from '@/lib/rules/source-words';
import { ToleranceMark } from './tolerance-mark';

/** What moved since the last approval, and under it what it is measured against, or why nothing was done. */
export function VerdictCell({ row, refusal }: { row: QueueRow; refusal: Refusal | null }) {
  return (
    <span className="flex min-w-0 flex-col justify-center">
      <span className={cn('truncate text-14', row.beyond_tolerance && 'font-medium', row.value_id !== null && 'text-ink-2')} title={verdictSentence(row)}>
        {verdictSentence(row)}
      </span>
      {refusal === null ? <Against row={row} /> : <RefusalLine refusal={refusal} />}
    </span>
  );
}

function RefusalLine({ refusal }: { refusal: Refusal }) {
  const now = refusal.current?.mass_kg == null ? '' : ` Now ${formatProse(refusal.current.mass_kg)} kg${refusal.current.set_by === null ? '' : `, set by ${refusal.current.set_by}`}.`;
  return (
    <span role="alert" className="truncate text-13 text-wrong" title={refusal.message + now}>
      {refusal.message}
      {now}
    </span>
  );
}

function Against({ row }: { row: QueueRow }) {
  if (row.own) return <span className="truncate text-13 text-ink-2">{whyNotApprovable(row)}</span>;
  if (row.last === null) return row.reason === null ? null : <Reason row={row} />;
  return (
    <span className="flex min-w-0 items-center gap-3 text-13 text-ink-3">
      {row.beyond_tolerance === null ? null : <ToleranceMark beyond={row.beyond_tolerance} />}
      <span className="truncate" title={row.last.note ?? undefined}>
        {row.value_id === null ? `against ${row.last.version}, approved by` : 'by'} {row.last.approved_by}, <Moment at={row.last.approved_at} />
        {row.last.note === null ? null : <>: “{row.last.note}”</>}
      </span>
    </span>
  );
}

function Reason({ row }: { row: QueueRow }) {
  return (
    <span className="truncate text-13 text-ink-2" title={row.reason ?? undefined}>
      “{row.reason}”
    </span>
  );
}

/** Who set the value, and who asks for it with which words. */
export function PeopleCell({ row }: { row: QueueRow }) {
  const setBy = row.set_from === null && row.set_by !== null ? `Drafted by ${row.set_by}` : setByWords(row);
  return (
    <span className="flex min-w-0 flex-col justify-center text-13">
      {row.request === null ? null : <AskedLine row={row} />}
      <span className="truncate text-ink-3" title={row.setters.length > 1 ? `Set since by ${row.setters.join(', ')}` : undefined}>
        {setBy ?? 'With its version'}
      </span>
    </span>
  );
}

function AskedLine({ row: { request } }: { row: QueueRow }) {
  if (request === null) return null;
  const words = `Asked by ${request.own ? 'you' : request.asked_by}${request.note === null ? '' : `: “${request.note}”`}`;
  return (
    <span className="flex min-w-0 items-center gap-1.5 text-ink" title={words}>
      <AskedShape />
      <span className="truncate">{words}</span>
      {request.changed ? <span className="shrink-0 text-ink-2">changed since</span> : null}
    </span>
  );
}

/** A raised hand drawn as a flag on its staff. */
export function AskedShape() {
  return (
    <svg viewBox="0 0 12 14" width="12" height="14" aria-hidden fill="none" stroke="currentColor" strokeWidth="1.5" className="shrink-0 text-brass">
      <path d="M2.5 13V1.5M2.5 2H10L8 4.75 10 7.5H2.5" strokeLinejoin="round" />
    </svg>
  );
}

export function WarningsCell({ row }: { row: QueueRow }) {
  return <ProblemCounts findings={row.warnings} />;
}
