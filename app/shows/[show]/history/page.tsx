import type { Metadata } from 'next';
import { HistoryCsv } from '@/components/history/history-csv';
import { HistoryView } from '@/components/history/history-view';
import { TellMe } from '@/components/notices/tell-me';
import { PageHeading } from '@/components/shell/page-heading';
import { getPageHistory, type SearchParams } from '@/lib/history/get-page-history';
import { getTold } from '@/lib/notices/get-told';
import { getPageShow } from '@/lib/shows/get-page-show';
import { setToldAction } from '../actions';

export const metadata: Metadata = { title: 'History' };

interface HistoryPageProps {
  params: Promise<{ show: string }>;
  searchParams: Promise<SearchParams>;
}

export default async function HistoryPage({ params, searchParams }: HistoryPageProps) {
  const { context, access } = await getPageShow((await params).show, 'readHistory');
  const { code } = access.show;
  const [{ csvHref, ...history }, told] = await Promise.all([getPageHistory(context, code, await searchParams), getTold(context, { show: code })]);
  return (
    <>
      <PageHeading
        title="History"
        measure={<TellMe show={code} answer={told} send={setToldAction} />}
        actions={<HistoryCsv href={csvHref} />}
      />
      <HistoryView {...history} />
    </>
  );
}
