import type { Metadata } from 'next';
import { setToldAction } from '@/app/shows/[show]/actions';
import { TellMe } from '@/components/notices/tell-me';
import { ShotPage } from '@/components/shots/shot-page';
import { getTold } from '@/lib/notices/get-told';
import { getPageShot } from '@/lib/shots/get-page-shot';
import { listAssetCodes } from '@/lib/shots/list-asset-codes';
import { shotActs } from '@/lib/shots/shot-acts';
import { getPageShow } from '@/lib/shows/get-page-show';
import { showFrame } from '@/lib/shows/show-frame';
import { draftOverrideAction, dropOverrideAction, lockShotsAction, lockValuesAction, putShotsAction, relockValuesAction, removeFromShotAction, unlockValuesAction } from '../actions';

type Props = { params: Promise<{ show: string; shot: string }> };

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: decodeURIComponent((await params).shot) };
}

export default async function Page({ params }: Props) {
  const { show, shot: code } = await params;
  const { context, access } = await getPageShow(show, 'readShow');
  const shot = await getPageShot(context, access.show.code, code);
  const told = await getTold(context, { show: access.show.code, shot: shot.code });
  const acts = shotActs(access);
  const assets = acts.may_edit ? await listAssetCodes(context, { show: access.show.code }) : [];
  return (
    <ShotPage
      frame={showFrame(access)}
      acts={acts}
      shot={shot}
      assets={assets}
      tellMe={<TellMe show={access.show.code} shot={shot.code} answer={told} send={setToldAction} />}
      actions={{
        put: putShotsAction,
        remove: removeFromShotAction,
        lockShots: lockShotsAction,
        lockValues: lockValuesAction,
        unlock: unlockValuesAction,
        relock: relockValuesAction,
        draft: draftOverrideAction,
        drop: dropOverrideAction,
      }}
    />
  );
}
