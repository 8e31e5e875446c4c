import { ListObjectsV2Command, type ListObjectsV2CommandOutput } from '@aws-sdk/client-s3';
import type { StoredFile } from './list-stored';
import { s3Place } from './s3-client';

/** Every object of the bucket under a folder. Asked of the bucket itself, since flydrive's list leaves sizes out. */
export async function* listBucket(folder: string): AsyncIterable<StoredFile> {
  const { client, bucket: Bucket } = s3Place();
  let ContinuationToken: string | undefined;
  do {
    const page: ListObjectsV2CommandOutput = await client.send(new ListObjectsV2Command({ Bucket, Prefix: `${folder}/`, ContinuationToken }));
    for (const { Key, Size, LastModified } of page.Contents ?? []) {
      if (Key !== undefined && Size !== undefined && LastModified !== undefined) yield { key: Key, byteSize: Size, modified: LastModified };
    }
    ContinuationToken = page.NextContinuationToken;
  } while (ContinuationToken !== undefined);
}
