import type { Metadata } from 'next';
import Link from 'next/link';
import { HistoryCsv } from '@/components/history/history-csv';
import { HistoryView } from '@/components/history/history-view';
import { PageHeading } from '@/components/shell/page-heading';
import { getPageHistory, type SearchParams } from '@/lib/history/get-page-history';
import { getPageShow } from '@/lib/shows/get-page-show';
import { orNotFound } from '@/lib/shows/or-not-found';
import { findShot } from '@/lib/shots/find-shot';

interface ShotHistoryProps {
  params: Promise<{ show: string; shot: string }>;
  searchParams: Promise<SearchParams>;
}

export async function generateMetadata({ params }: ShotHistoryProps): Promise<Metadata> {
  return { title: `History of ${decodeURIComponent((await params).shot)}` };
}

export default async function ShotHistoryPage({ params, searchParams }: ShotHistoryProps) {
  const { show, shot } = await params;
  const { context, access } = await getPageShow(show, 'readHistory');
  const { code } = await orNotFound(findShot(context.db, access.show.id, decodeURIComponent(shot)));
  const { csvHref, ...history } = await getPageHistory(context, access.show.code, await searchParams, { shot: code });
  return (
    <>
      <PageHeading
        title={
          <>
            History of{' '}
            <Link href={`/shows/${encodeURIComponent(access.show.code)}/shots/${encodeURIComponent(code)}`} className="link break-all">
              {code}
            </Link>
          </>
        }
        actions={<HistoryCsv href={csvHref} />}
      />
      <HistoryView {...history} without={['shot']} />
    </>
  );
}
