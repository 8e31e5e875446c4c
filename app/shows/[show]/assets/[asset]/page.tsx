import type { Metadata } from 'next';
import { approvalActions } from '@/app/shows/[show]/approvals/approval-actions';
import { setToldAction } from '@/app/shows/[show]/actions';
import { lockShotsAction } from '@/app/shows/[show]/shots/actions';
import { AssetPage } from '@/components/assets/asset-page';
import { LockAsset } from '@/components/locks/lock-asset';
import { TellMe } from '@/components/notices/tell-me';
import { PartRenames } from '@/components/renames/part-renames';
import { getTold } from '@/lib/notices/get-told';
import { getPageAsset } from '@/lib/parts/get-page-part';
import { may } from '@/lib/rules/roles';
import { shotActs } from '@/lib/shots/shot-acts';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';

type Props = { params: Promise<{ show: string; asset: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: decodeURIComponent((await params).asset) };
}

export default async function OneAssetPage({ params }: Props) {
  const { show, asset } = await params;
  const { context, access } = await getPageShow(show, 'readShow');
  const { code } = access.show;
  const detail = await getPageAsset(context, code, asset);
  const told = await getTold(context, { show: code, asset: detail.total.asset });
  const tellMe = <TellMe show={code} asset={detail.total.asset} answer={told} send={setToldAction} />;
  const locking = shotActs(access).may_lock ? <LockAsset show={code} asset={detail.total.asset} lockShots={lockShotsAction} /> : null;
  const renames = <PartRenames show={code} scope={{ asset: detail.total.asset }} mayDecide={may(access.role, 'renameParts') && access.show.archivedAt === null} />;
  return <AssetPage frame={showFrame(access)} detail={detail} actions={approvalActions} locking={locking} tellMe={tellMe} renames={renames} />;
}
