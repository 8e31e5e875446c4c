import type { Metadata } from 'next';
import Link from 'next/link';
import { HistoryCsv } from '@/components/history/history-csv';
import { HistoryView } from '@/components/history/history-view';
import { PageHeading } from '@/components/shell/page-heading';
import { getPageHistory, type SearchParams } from '@/lib/history/get-page-history';
import { getPageShow } from '@/lib/shows/get-page-show';

interface PartHistoryProps {
  params: Promise<{ show: string; asset: string; part: string }>;
  searchParams: Promise<SearchParams>;
}

export async function generateMetadata({ params }: PartHistoryProps): Promise<Metadata> {
  const { asset, part } = await params;
  return { title: `History of ${decodeURIComponent(asset)}/${decodeURIComponent(part)}` };
}

export default async function PartHistoryPage({ params, searchParams }: PartHistoryProps) {
  const { show, ...named } = await params;
  const { context, access } = await getPageShow(show, 'readHistory');
  const about = { asset: decodeURIComponent(named.asset), part: decodeURIComponent(named.part) };
  const { csvHref, ...history } = await getPageHistory(context, access.show.code, await searchParams, about);
  return (
    <>
      <PageHeading
        title={
          <>
            History of{' '}
            <Link href={`/shows/${encodeURIComponent(access.show.code)}/assets/${encodeURIComponent(about.asset)}/${encodeURIComponent(about.part)}`} className="link break-all">
              {about.asset}/{about.part}
            </Link>
          </>
        }
        actions={<HistoryCsv href={csvHref} />}
      />
      <HistoryView {...history} without={['part']} />
    </>
  );
}
