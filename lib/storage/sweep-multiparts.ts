import type { ListMultipartUploadsCommandOutput } from '@aws-sdk/client-s3';
import { config } from '@/lib/config';
import { BLOBS, PARTS, UNFINISHED } from './disk';

const DAY_MS = 24 * 3_600_000;

/**
 * Ends multipart uploads of the bucket that a dead process left, once they are a day old: nothing lists their bytes, but they are kept
 * and paid for. A storage that cannot list them is left to its own rules. Answers how many.
 */
export async function sweepMultiparts(now = Date.now()): Promise<number> {
  if (config().s3 === null) return 0;
  const { AbortMultipartUploadCommand, ListMultipartUploadsCommand } = await import('@aws-sdk/client-s3');
  const { client, bucket: Bucket } = (await import('./s3-client')).s3Place();
  let ended = 0;
  for (const folder of [BLOBS, PARTS, UNFINISHED]) {
    let markers: { KeyMarker?: string; UploadIdMarker?: string } = {};
    for (let isMore = true; isMore; ) {
      let page: ListMultipartUploadsCommandOutput;
      try {
        page = await client.send(new ListMultipartUploadsCommand({ Bucket, Prefix: `${folder}/`, ...markers }));
      } catch (error) {
        if (error instanceof Error && error.name === 'NotImplemented') return ended;
        throw error;
      }
      for (const { Key, UploadId, Initiated } of page.Uploads ?? []) {
        if (!Initiated || now - Initiated.getTime() < DAY_MS) continue;
        await client.send(new AbortMultipartUploadCommand({ Bucket, Key, UploadId }));
        ended++;
      }
      markers = { KeyMarker: page.NextKeyMarker, UploadIdMarker: page.NextUploadIdMarker };
      isMore = page.IsTruncated === true;
    }
  }
  return ended;
}
