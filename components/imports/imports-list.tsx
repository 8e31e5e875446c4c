import Link from 'next/link';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ImportAnswer } from '@/lib/rules/import-answer';
import { IMPORT_STATE_WORDS } from './import-progress';

const WHEN = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric', hour: '2-digit', minute: '2-digit', timeZone: 'UTC' });

/** A show's imports, newest first. */
export function ImportsList({ show, items }: { show: string; items: readonly ImportAnswer[] }) {
  return (
    <Table>
      <thead>
        <tr>
          <TableHead className="pl-4 md:pl-6">Opened, UTC</TableHead>
          <TableHead>By</TableHead>
          <TableHead>State</TableHead>
          <TableHead className="text-right">Files</TableHead>
          <TableHead className="text-right">Measured</TableHead>
          <TableHead className="pr-4 text-right md:pr-6">Failed</TableHead>
        </tr>
      </thead>
      <tbody>
        {items.map((item) => (
          <TableRow key={item.id} className="h-9 hover:bg-raised">
            <TableCell className="pl-4 md:pl-6">
              <Link className="link" href={`/shows/${show}/imports/${item.id}`}>
                {WHEN.format(new Date(item.created_at))}
              </Link>
            </TableCell>
            <TableCell className="text-ink-2">{item.created_by}</TableCell>
            <TableCell className="text-ink-2">{IMPORT_STATE_WORDS[item.state]}</TableCell>
            <TableCell className="text-right">{item.counts.total.toLocaleString('en')}</TableCell>
            <TableCell className="text-right">{item.counts.done.toLocaleString('en')}</TableCell>
            <TableCell className={`pr-4 text-right md:pr-6 ${item.counts.failed > 0 ? 'text-wrong' : 'text-ink-3'}`}>{item.counts.failed.toLocaleString('en')}</TableCell>
          </TableRow>
        ))}
      </tbody>
    </Table>
  );
}
