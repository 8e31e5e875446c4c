import type { Metadata } from 'next';
import { ComparePage } from '@/components/compare/compare-page';
import { getPageComparison } from '@/lib/compare/get-page-comparison';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';

export const metadata: Metadata = { title: 'Compare' };

type Props = { params: Promise<{ show: string }>; searchParams: Promise<Record<string, string | string[] | undefined>> };

export default async function CompareValuesPage({ params, searchParams }: Props) {
  const { context, access } = await getPageShow((await params).show, 'readShow');
  return <ComparePage frame={showFrame(access)} of={await getPageComparison(context, access.show.code, await searchParams)} />;
}
