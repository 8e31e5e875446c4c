import { notFound } from 'next/navigation';
import type { ActorContext } from '@/lib/context';
import type { AssetDetail, PartDetail } from '@/lib/rules/part-detail';
import { StudioError } from '@/lib/rules/studio-error';
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

async function orNotFound<T>(found: Promise<T>): Promise<T> {
  try {
    return await found;
  } catch (error) {
    if (error instanceof StudioError && error.code === 'not_found') notFound();
    throw error;
  }
}
