import { S3Client } from '@aws-sdk/client-s3';
import { config, type Config } from '@/lib/config';

export interface S3Place {
  client: S3Client;
  bucket: string;
}

let cached: { from: Config['s3']; place: S3Place } | null = null;

/** The bucket that the studio's files go to. Only where one is configured. */
export function s3Place(): S3Place {
  const { s3 } = config();
  if (s3 === null) throw new Error('No bucket is configured.');
  if (cached?.from !== s3) {
    const client = new S3Client({
      region: s3.region,
      forcePathStyle: s3.pathStyle,
      ...(s3.endpoint === null ? {} : { endpoint: s3.endpoint }),
      ...(s3.keys === null ? {} : { credentials: s3.keys }),
      // Our own SHA-256 is checked end to end; many storages of one's own know no other checksums.
      requestChecksumCalculation: 'WHEN_REQUIRED',
      responseChecksumValidation: 'WHEN_REQUIRED',
      maxAttempts: 4,
      requestHandler: { connectionTimeout: 5_000, requestTimeout: 60_000 },
    });
    cached = { from: s3, place: { client, bucket: s3.bucket } };
  }
  return cached.place;
}
