import type { Metadata } from 'next';
import { approvalActions } from '@/app/shows/[show]/approvals/approval-actions';
import { PartPage } from '@/components/parts/part-page';
import { getPagePart } from '@/lib/parts/get-page-part';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';

type Props = { params: Promise<{ show: string; asset: string; part: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { asset, part } = await params;
  return { title: `${decodeURIComponent(asset)}/${decodeURIComponent(part)}` };
}

export default async function OnePartPage({ params }: Props) {
  const { show, asset, part } = await params;
  const { context, access } = await getPageShow(show, 'readShow');
  return <PartPage frame={showFrame(access)} initial={await getPagePart(context, access.show.code, asset, part)} actions={approvalActions} />;
}
