import Link from 'next/link';
import { Button } from '@/components/ui/button';
import { EmptyState } from '@/components/ui/empty-state';
import { Table, TableCell, TableHead, TableRow } from '@/components/ui/table';
import type { ReceiptPage } from '@/lib/rules/export-preview';

/** Who took which rows, when, and with which checksum. */
export function ReceiptTable({ page, href }: { page: ReceiptPage; href: string }) {
  if (page.items.length === 0) {
    return <EmptyState title="No receipts yet">Every download, and every token that reads values, leaves one here.</EmptyState>;
  }
  return (
    <>
      <Table>
        <thead>
          <tr>
            <TableHead className="pl-4 md:pl-6">Taken (UTC)</TableHead>
            <TableHead>By</TableHead>
            <TableHead>With</TableHead>
            <TableHead>Format</TableHead>
            <TableHead>Selection</TableHead>
            <TableHead className="text-right">Rows</TableHead>
            <TableHead className="text-right">Bytes</TableHead>
            <TableHead>SHA-256</TableHead>
          </tr>
        </thead>
        <tbody>
          {page.items.map((receipt) => (
            <TableRow key={receipt.id}>
              <TableCell className="pl-4 font-mono text-13 md:pl-6">
                <time dateTime={receipt.taken_at}>{receipt.taken_at.slice(0, 19).replace('T', ' ')}</time>
              </TableCell>
              <TableCell>{receipt.taken_by}</TableCell>
              <TableCell className="text-ink-2">{receipt.token === null ? 'browser' : `token ${receipt.token}`}</TableCell>
              <TableCell className="font-mono text-13">{receipt.format}</TableCell>
              <TableCell className="max-w-80 truncate font-mono text-13 text-ink-2" title={receipt.selection}>
                {receipt.selection === '' ? 'all' : decodeURIComponent(receipt.selection)}
              </TableCell>
              <TableCell className="text-right font-mono text-13">{receipt.rows.toLocaleString('en')}</TableCell>
              <TableCell className="text-right font-mono text-13">{receipt.bytes.toLocaleString('en')}</TableCell>
              <TableCell className="font-mono text-13" title={receipt.sha256}>
                <span data-full={receipt.sha256}>{receipt.sha256.slice(0, 12)}…</span>
              </TableCell>
            </TableRow>
          ))}
        </tbody>
      </Table>
      {page.next_cursor === null ? null : (
        <div className="px-4 py-4 md:px-6">
          <Button asChild>
            <Link href={`${href}?cursor=${encodeURIComponent(page.next_cursor)}`}>Older receipts</Link>
          </Button>
        </div>
      )}
    </>
  );
}
