import type { Metadata } from 'next';
import { approvalActions } from '@/app/shows/[show]/approvals/approval-actions';
import { AssetPage } from '@/components/assets/asset-page';
import { getPageAsset } from '@/lib/parts/get-page-part';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';

type Props = { params: Promise<{ show: string; asset: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: decodeURIComponent((await params).asset) };
}

export default async function OneAssetPage({ params }: Props) {
  const { show, asset } = await params;
  const { context, access } = await getPageShow(show, 'readShow');
  return <AssetPage frame={showFrame(access)} detail={await getPageAsset(context, access.show.code, asset)} actions={approvalActions} />;
}
