import { Disk } from 'flydrive';
import { S3Driver } from 'flydrive/drivers/s3';
import { s3Place } from './s3-client';

/** The storage in the configured bucket. */
export function s3Disk(): Disk {
  return new Disk(new S3Driver({ ...s3Place(), visibility: 'private', supportsACL: false }));
}
