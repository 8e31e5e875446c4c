import { createHash } from 'node:crypto';
import type { Beside } from '@/lib/formats/beside';
import { joinBytes } from '@/lib/formats/join-bytes';
import { readBlob } from '@/lib/storage/read-blob';

/** A file that lies beside the one that is read: its path from there, and the hash of its bytes. */
export interface BesideBlob {
  path: string;
  sha256: string;
}

/** Finds among stored files by their paths. Each is held whole. Throws what storage throws. */
export function besideOfBlobs(blobs: readonly BesideBlob[] = []): Beside {
  return async (path) => {
    const found = blobs.find((blob) => blob.path === path);
    if (!found) return null;
    const pieces: Uint8Array[] = [];
    for await (const piece of await readBlob(found.sha256)) pieces.push(piece);
    return joinBytes(pieces);
  };
}

/** One hash of all files beside another, for the key of its record; empty where there are none. */
export function besideHash(blobs: readonly BesideBlob[]): string {
  if (blobs.length === 0) return '';
  const lines = blobs.map(({ path, sha256 }) => JSON.stringify([path, sha256])).sort();
  return createHash('sha256').update(lines.join('\n')).digest('hex');
}
