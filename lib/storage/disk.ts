import path from 'node:path';
import { Disk } from 'flydrive';
import { FSDriver } from 'flydrive/drivers/fs';
import { config } from '@/lib/config';

/** Folders of the storage: whole files by content, parts of uploads that go on, and what is being written. */
export const BLOBS = 'blobs';
export const PARTS = 'parts';
export const UNFINISHED = 'uploads';

let cached: { from: unknown; disk: Promise<Disk> } | null = null;

/** The studio's storage: a folder, or a bucket where one is configured, whose client is loaded then alone. Written to by receiveBytes and the sweeps. */
export function disk(): Promise<Disk> {
  const { s3, filesFolder } = config();
  const from = s3 ?? filesFolder;
  if (cached?.from !== from) {
    const made = s3 ? import('./s3-disk').then(({ s3Disk }) => s3Disk()) : Promise.resolve(new Disk(new FSDriver({ location: filesFolder, visibility: 'private' })));
    cached = { from, disk: made };
  }
  return cached.disk;
}

/** Where the bytes with this SHA-256 (64 hex digits) lie. */
export function blobKey(sha256: string): string {
  return `${BLOBS}/${sha256.slice(0, 2)}/${sha256}`;
}

/** Where one part of an upload lies; its hash is in the key, so that a part that comes again never overwrites another's bytes. */
export function partKey(uploadId: string, number: number, sha256: string): string {
  return `${PARTS}/${uploadId}/${number}-${sha256}`;
}

/** The path of a key where the storage is a folder. */
export function pathInFolder(key: string): string {
  return path.join(config().filesFolder, key);
}
