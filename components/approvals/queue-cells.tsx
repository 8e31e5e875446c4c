import { ProblemCounts } from '@/components/parts/problem-counts';
import { cn } from '@/components/ui/cn';
import { Moment } from '@/components/ui/moment';
import type { Refusal } from '@/hooks/use-approval-acts';
import { ORIGIN_WORDS } from '@/lib/rules/act-words';
import { verdictSentence, whyNotApprovable, type QueueRow } from '@/lib/rules/approval-queue';
import { formatProse } from '@/lib/rules/format-figure';
import { sourceSentence } from '@/lib/rules/source-words';
import { ToleranceMark } from './tolerance-mark';

/** What moved since the last approval, and under it what it is measured against, or why nothing was done. */
export function VerdictCell({ row, refusal }: { row: QueueRow; refusal: Refusal | null }) {
  return (
    <span className="flex min-w-0 flex-col justify-center">
      <span
        className={cn('truncate text-14', row.beyond_tolerance && 'font-medium', row.value_id !== null && 'text-ink-2')}
        title={verdictSentence(row)}
      >
        {verdictSentence(row)}
      </span>
      {refusal === null ? <Against row={row} /> : <RefusalLine refusal={refusal} />}
    </span>
  );
}

function RefusalLine({ refusal }: { refusal: Refusal }) {
  const now =
    refusal.current?.mass_kg == null
      ? ''
      : ` Now ${formatProse(refusal.current.mass_kg)} kg${refusal.current.set_by === null ? '' : `, set by ${refusal.current.set_by}`}.`;
  return (
    <span role="alert" className="truncate text-13 text-wrong" title={refusal.message + now}>
      {refusal.message}
      {now}
    </span>
  );
}

function Against({ row }: { row: QueueRow }) {
  if (row.own) return <span className="truncate text-13 text-ink-2">{whyNotApprovable(row)}</span>;
  if (row.reason !== null && row.last === null) return <Quiet words={`“${row.reason}”`} />;
  if (row.last === null) return <Quiet words={`${row.construction}; ${lower(sourceSentence(row))}`} />;
  return (
    <span className="flex min-w-0 items-center gap-3 text-13 text-ink-3">
      {row.beyond_tolerance === null ? null : <ToleranceMark beyond={row.beyond_tolerance} />}
      <span className="truncate" title={row.last.note ?? undefined}>
        {row.value_id === null ? `against ${row.last.version} by` : 'by'} {row.last.approved_by},{' '}
        <Moment day at={row.last.approved_at} />
        {row.last.note === null ? null : <>: “{row.last.note}”</>}
      </span>
    </span>
  );
}

function Quiet({ words }: { words: string }) {
  return (
    <span className="truncate text-13 text-ink-3" title={words}>
      {words}
    </span>
  );
}

function lower(sentence: string): string {
  return sentence.charAt(0).toLowerCase() + sentence.slice(1).replace(/\.$/, '');
}

/** What somebody asks with which words, and who asked and who set the value. */
export function PeopleCell({ row }: { row: QueueRow }) {
  const { request } = row;
  const words = peopleWords(row);
  return (
    <span className="flex min-w-0 flex-col justify-center text-13">
      {request === null ? null : (
        <span className="flex min-w-0 items-center gap-1.5 text-ink" title={request.note ?? undefined}>
          <AskedShape />
          <span className="truncate">{request.note === null ? 'asked for' : `“${request.note}”`}</span>
          {request.changed ? <span className="shrink-0 text-ink-2">changed since</span> : null}
        </span>
      )}
      <span className="truncate text-ink-3" title={words}>
        {words}
      </span>
    </span>
  );
}

/** Who asked and who set it, once where both are one. */
function peopleWords({ request, set_by: setBy, set_from: from, shot, setters }: QueueRow): string {
  const origin = from === null || ORIGIN_WORDS[from] === '' ? '' : `, ${ORIGIN_WORDS[from]}`;
  const setWord = shot === null ? 'set' : 'drafted';
  const asked = request === null ? null : request.own ? 'you' : request.asked_by;
  const others = setters.filter((name) => name !== setBy);
  const more = others.length === 0 ? '' : `, with ${others.join(', ')}`;
  if (setBy === null) return asked === null ? 'came with its version' : `asked by ${asked}`;
  if (request !== null && request.asked_by === setBy) return `asked and ${setWord} by ${asked}${more}${origin}`;
  return `${asked === null ? '' : `asked by ${asked}, `}${setWord} by ${setBy}${more}${origin}`;
}

/** A raised hand drawn as a flag on its staff. */
export function AskedShape() {
  return (
    <svg
      viewBox="0 0 12 14"
      width="12"
      height="14"
      aria-hidden
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      className="shrink-0 text-brass"
    >
      <path d="M2.5 13V1.5M2.5 2H10L8 4.75 10 7.5H2.5" strokeLinejoin="round" />
    </svg>
  );
}

export function WarningsCell({ row }: { row: QueueRow }) {
  return <ProblemCounts findings={row.warnings} />;
}
