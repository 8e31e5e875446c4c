'use client';

import Link from 'next/link';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import { cn } from '@/components/ui/cn';
import { useImportLive } from '@/hooks/use-import-live';
import type { ImportAnswer, ImportSummary } from '@/lib/rules/import-answer';
import { timeLeftWords } from '@/lib/rules/time-left';
import { importStateWords } from './import-state-words';

const WHEN = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', timeZone: 'UTC' });

/** Imports that are followed at once; older ones that still go on are as they were when the page was read. */
const MOST_FOLLOWED = 12;

const isGoing = ({ state }: ImportAnswer): boolean => state === 'queued' || state === 'running';
const ignore = () => undefined;

interface ImportsListProps {
  show: string;
  items: readonly ImportAnswer[];
  /** From when on their news are followed. */
  mark: string;
}

/** A show's imports, newest first. Those that go on are told as they go. */
export function ImportsList({ show, items, mark }: ImportsListProps) {
  const followed = new Set(items.filter(isGoing).slice(0, MOST_FOLLOWED).map((item) => item.id));
  return (
    <Table>
      <thead>
        <tr>
          <TableHead className="pl-4 md:pl-6">Opened, UTC</TableHead>
          <TableHead>By</TableHead>
          <TableHead className="w-full">State</TableHead>
          <TableHead className="text-right">Files</TableHead>
          <TableHead className="text-right">Measured</TableHead>
          <TableHead className="pr-4 text-right md:pr-6">Failed</TableHead>
        </tr>
      </thead>
      <tbody>{items.map((item) => (followed.has(item.id) ? <LiveLine key={item.id} show={show} item={{ ...item, mark }} /> : <Line key={item.id} show={show} item={item} />))}</tbody>
    </Table>
  );
}

function LiveLine({ show, item }: { show: string; item: ImportSummary }) {
  const { summary } = useImportLive(show, item, ignore);
  return <Line show={show} item={summary} />;
}

function Line({ show, item }: { show: string; item: ImportAnswer }) {
  const { counts } = item;
  return (
    <TableRow className="h-9 hover:bg-raised">
      <TableCell className="pl-4 md:pl-6">
        <Link className="link" href={`/shows/${show}/imports/${item.id}`}>
          {WHEN.format(new Date(item.created_at))}
        </Link>
      </TableCell>
      <TableCell className="max-w-48 truncate text-ink-2" title={item.created_by}>
        {item.created_by}
      </TableCell>
      <TableCell className="text-ink-2">
        <span className="flex items-center gap-3">
          {importStateWords(item)}
          {isGoing(item) && counts.total > 0 ? (
            <span aria-hidden className="hidden h-1 w-24 bg-rule sm:block">
              <span className="block h-full bg-brass" style={{ width: `${(100 * (counts.done + counts.failed)) / counts.total}%` }} />
            </span>
          ) : null}
          {isGoing(item) && !item.paused && item.seconds_left ? <span className="text-13 text-ink-3">{timeLeftWords(item.seconds_left)}</span> : null}
        </span>
      </TableCell>
      <TableCell className="text-right font-mono text-13">{counts.total.toLocaleString('en')}</TableCell>
      <TableCell className="text-right font-mono text-13">{counts.done.toLocaleString('en')}</TableCell>
      <TableCell className={cn('pr-4 text-right font-mono text-13 md:pr-6', counts.failed > 0 ? 'text-wrong' : 'text-ink-3')}>{counts.failed.toLocaleString('en')}</TableCell>
    </TableRow>
  );
}
