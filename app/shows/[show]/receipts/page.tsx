import type { Metadata } from 'next';
import { Caution } from '@/components/exports/caution';
import { ReceiptTable } from '@/components/exports/receipt-table';
import { PageHeading } from '@/components/shell/page-heading';
import { isReceiptCursor, listReceipts } from '@/lib/exports/list-receipts';
import { listReceiptsInput } from '@/lib/rules/inputs/list-receipts';
import { getPageShow } from '@/lib/shows/get-page-show';

export const metadata: Metadata = { title: 'Receipts' };

type Props = { params: Promise<{ show: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> };

export default async function ReceiptsPage({ params, searchParams }: Props) {
  const { context, access } = await getPageShow((await params).show, 'readShow');
  const { cursor } = await searchParams;
  const show = access.show.code;
  // An address that somebody cut short shows the newest.
  const input = listReceiptsInput.parse({ show, cursor: typeof cursor === 'string' && isReceiptCursor(cursor) ? cursor : undefined });
  return (
    <>
      <PageHeading title="Receipts" />
      <ReceiptTable page={await listReceipts(context, input)} href={`/shows/${encodeURIComponent(show)}/receipts`} />
      <Caution />
    </>
  );
}
