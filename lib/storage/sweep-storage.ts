import type { Database } from '@/db/client';
import { recountUsage } from './recount-usage';
import { sweepMultiparts } from './sweep-multiparts';
import { sweepOrphanBlobs, sweepUnknownFiles } from './sweep-orphan-blobs';
import { sweepExpiredUploads, sweepLeftovers } from './sweep-parts';

/** What a sweep removed, by kind. */
export interface Swept {
  uploads: number;
  leftovers: number;
  blobs: number;
  unknown: number;
  multiparts: number;
}

/**
 * One sweep of the storage, safe beside uploads and other sweeps. What is removed is past its time: uploads that ran out, leftovers of a day,
 * bytes to which nothing has referred for the grace time.
 */
export async function sweepStorage(db: Database): Promise<Swept> {
  const swept = {
    uploads: await sweepExpiredUploads(db),
    leftovers: await sweepLeftovers(db),
    blobs: await sweepOrphanBlobs(db),
    unknown: await sweepUnknownFiles(db),
    multiparts: await sweepMultiparts(),
  };
  await recountUsage(db);
  return swept;
}
