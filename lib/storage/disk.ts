import path from 'node:path';
import { Disk } from 'flydrive';
import { FSDriver } from 'flydrive/drivers/fs';
import { config } from '@/lib/config';

let cached: { folder: string; disk: Disk } | null = null;

/** The studio's storage. Keys are `blobs/ab/<sha256>`; only storeBlob and the sweep of temporary files write here. */
export function disk(): Disk {
  const folder = config().filesFolder;
  if (cached?.folder !== folder) cached = { folder, disk: new Disk(new FSDriver({ location: folder, visibility: 'private' })) };
  return cached.disk;
}

/** Where the bytes with this SHA-256 (64 hex digits) lie. */
export function blobKey(sha256: string): string {
  return `blobs/${sha256.slice(0, 2)}/${sha256}`;
}

/** Folder of uploads that are not finished; on the same volume as the blobs, so that a rename is atomic. */
export function uploadsFolder(): string {
  return path.join(config().filesFolder, 'uploads');
}
