import Link from 'next/link';
import { ProgressRule } from '@/components/states/progress-rule';
import { StateShape } from '@/components/states/state-mark';
import { cn } from '@/components/ui/cn';
import type { ShowSummary } from './show-list';

/** What waits for somebody, as links to its rows: state, words for one and for many. */
const NEEDS = [
  { state: 'blocked', one: 'part blocked', many: 'parts blocked' },
  { state: 'unset', one: 'part without a mass', many: 'parts without a mass' },
  { state: 'outdated', one: 'part out of date', many: 'parts out of date' },
] as const;

export function ShowRow({ show, roleName }: { show: ShowSummary; roleName: string }) {
  const href = `/shows/${encodeURIComponent(show.code)}`;
  const { parts } = show;
  return (
    <li className="grid gap-x-8 gap-y-3 border-b border-rule px-4 py-4 md:grid-cols-[minmax(14rem,1fr)_minmax(12rem,16rem)_minmax(0,1.4fr)] md:px-6">
      <div className="min-w-0">
        {parts === null ? (
          <p className="truncate text-16 font-medium">{show.title}</p>
        ) : (
          <Link href={href} className="block truncate text-16 font-medium hover:text-brass">
            {show.title}
          </Link>
        )}
        <p className="mt-0.5 text-13 text-ink-3">
          <span className="font-mono">{show.code}</span> · {roleName}
        </p>
      </div>
      <div className="text-14">
        {show.archived ? <p className="text-ink-3">Archived, to read only</p> : <Needs parts={parts} href={href} />}
      </div>
      <div className="min-w-0">{parts === null ? null : <ProgressRule counts={parts} />}</div>
    </li>
  );
}

function Needs({ parts, href }: { parts: ShowSummary['parts']; href: string }) {
  if (parts === null) return <p className="text-ink-3">Nothing is locked for you yet</p>;
  const total = Object.values(parts).reduce((sum, count) => sum + count, 0);
  if (total === 0) {
    return (
      <p className="text-ink-2">
        No parts yet.{' '}
        <Link href={`${href}/import`} className="link">
          Import cages
        </Link>
      </p>
    );
  }
  const needs = NEEDS.filter((need) => parts[need.state] > 0);
  if (needs.length === 0) return <p className="text-ink-2">Every part has its mass</p>;
  return (
    <ul className="flex flex-col gap-1" aria-label="Needs you">
      {needs.map(({ state, one, many }) => (
        <li key={state}>
          <Link
            href={`${href}?state=${state}`}
            className={cn(
              'link inline-flex items-center gap-2 pointer-coarse:min-h-11',
              state === 'blocked' && 'text-wrong',
            )}
          >
            <StateShape state={state} />
            {parts[state].toLocaleString('en')} {parts[state] === 1 ? one : many}
          </Link>
        </li>
      ))}
    </ul>
  );
}
