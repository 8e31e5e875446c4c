import { randomUUID } from 'node:crypto';
import { PassThrough } from 'node:stream';
import { CopyObjectCommand, CreateMultipartUploadCommand, AbortMultipartUploadCommand, CompleteMultipartUploadCommand, UploadPartCopyCommand, type CompletedPart } from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import { disk, UNFINISHED } from './disk';
import type { Landing } from './receive-bytes';
import { s3Place, type S3Place } from './s3-client';

/** What is smaller is held in memory and put at once; S3 wants parts of at least 5 MiB. */
export const S3_PART_BYTES = 8 * 1024 * 1024;
/** S3 copies at most 5 GiB in one call. */
const COPY_PART_BYTES = 1024 ** 3;

/** Small bytes wait in memory; more go to the bucket as a multipart upload under a temporary key and are copied within it. */
export function receiveIntoS3(): Landing {
  const place = s3Place();
  const waiting: Uint8Array[] = [];
  let byteSize = 0;
  let long: LongUpload | null = null;
  return {
    write: async (chunk) => {
      byteSize += chunk.byteLength;
      if (long) return long.write(chunk);
      waiting.push(chunk);
      if (byteSize <= S3_PART_BYTES) return;
      long = startLongUpload(place);
      for (const one of waiting.splice(0)) await long.write(one);
    },
    close: async () => long?.end(),
    place: async (key) => {
      const bucket = await disk();
      if (await bucket.exists(key)) return;
      if (long) await copyWithin(place, long.key, key, byteSize);
      else await bucket.put(key, Buffer.concat(waiting, byteSize));
    },
    discard: async () => long?.discard(),
  };
}

interface LongUpload {
  key: string;
  write(chunk: Uint8Array): Promise<void>;
  end(): Promise<void>;
  discard(): Promise<void>;
}

function startLongUpload({ client, bucket }: S3Place): LongUpload {
  const key = `${UNFINISHED}/${randomUUID()}`;
  const body = new PassThrough({ highWaterMark: S3_PART_BYTES });
  const upload = new Upload({ client, params: { Bucket: bucket, Key: key, Body: body }, partSize: S3_PART_BYTES, queueSize: 2 });
  let isOver = false;
  const done = upload.done().finally(() => {
    isOver = true;
  });
  // Heard at the next write or at the end; unheard until then.
  done.catch(() => undefined);
  return {
    key,
    write: async (chunk) => {
      if (isOver) await done;
      if (!body.write(chunk)) await Promise.race([new Promise<void>((resolve) => body.once('drain', resolve)), done]);
    },
    end: async () => {
      body.end();
      await done;
    },
    discard: async () => {
      // A body that fails makes the upload end itself, its parts included, before it says so; its own abort would not wait for that.
      if (!isOver) {
        body.destroy(new Error('The upload broke off.'));
        await done.catch(() => undefined);
      }
      await (await disk()).delete(key);
    },
  };
}

/** Copies an object within the bucket: in one call, or range by range where it is too large for that. */
async function copyWithin({ client, bucket }: S3Place, from: string, to: string, byteSize: number): Promise<void> {
  const source = { Bucket: bucket, Key: to, CopySource: `/${bucket}/${from}` };
  if (byteSize <= COPY_PART_BYTES) {
    await client.send(new CopyObjectCommand(source));
    return;
  }
  const { UploadId } = await client.send(new CreateMultipartUploadCommand({ Bucket: bucket, Key: to }));
  try {
    const parts: CompletedPart[] = [];
    for (let start = 0; start < byteSize; start += COPY_PART_BYTES) {
      const PartNumber = parts.length + 1;
      const range = `bytes=${start}-${Math.min(byteSize, start + COPY_PART_BYTES) - 1}`;
      const copied = await client.send(new UploadPartCopyCommand({ ...source, UploadId, PartNumber, CopySourceRange: range }));
      parts.push({ PartNumber, ETag: copied.CopyPartResult?.ETag });
    }
    await client.send(new CompleteMultipartUploadCommand({ Bucket: bucket, Key: to, UploadId, MultipartUpload: { Parts: parts } }));
  } catch (error) {
    await client.send(new AbortMultipartUploadCommand({ Bucket: bucket, Key: to, UploadId })).catch(() => undefined);
    throw error;
  }
}
