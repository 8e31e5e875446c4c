import type { ActorContext } from '@/lib/context';
import type { AssetDetail, PartDetail } from '@/lib/rules/part-detail';
import { orNotFound } from '@/lib/shows/or-not-found';
import { getAsset } from './get-asset';
import { getPart } from './get-part';

/** An asset for its page, named as in the address; nothing there is the page for such addresses. */
export function getPageAsset(context: ActorContext, show: string, asset: string): Promise<AssetDetail> {
  return orNotFound(getAsset(context, { show, asset: decodeURIComponent(asset) }));
}

/** A part for its page, the same way. */
export function getPagePart(context: ActorContext, show: string, asset: string, part: string): Promise<PartDetail> {
  return orNotFound(getPart(context, { show, asset: decodeURIComponent(asset), part: decodeURIComponent(part) }));
}
