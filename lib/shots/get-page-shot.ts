import type { ActorContext } from '@/lib/context';
import type { SequenceDetail, ShotDetail } from '@/lib/rules/shot-detail';
import { orNotFound } from '@/lib/shows/or-not-found';
import { getSequence } from './get-sequence';
import { getShot } from './get-shot';

/** A shot for its page, named as in the address; nothing there is the page for such addresses. */
export function getPageShot(context: ActorContext, show: string, shot: string): Promise<ShotDetail> {
  return orNotFound(getShot(context, { show, shot: decodeURIComponent(shot) }));
}

/** A sequence for its page, the same way. */
export function getPageSequence(context: ActorContext, show: string, sequence: string): Promise<SequenceDetail> {
  return orNotFound(getSequence(context, { show, sequence: decodeURIComponent(sequence) }));
}
