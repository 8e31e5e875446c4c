import { createHash } from 'node:crypto';
import type { Beside } from '@/lib/formats/beside';
import { joinBytes } from '@/lib/formats/join-bytes';
import { folderOf, pathFrom } from '@/lib/formats/names-beside';
import { openBlob } from '@/lib/storage/open-blob';

/** A file that another one is read with: its path, as seen from where that one's is seen from, and the hash of its bytes. */
export interface BesideBlob {
  path: string;
  sha256: string;
}

/** Finds among stored files those that the file of this path mentions. Each is held whole. Throws what storage throws. */
export function besideOfBlobs(name: string, blobs: readonly BesideBlob[] = []): Beside {
  return async (mentioned) => {
    const path = pathFrom(name, mentioned);
    const found = blobs.find((blob) => blob.path === path);
    if (!found) return null;
    const pieces: Uint8Array[] = [];
    for await (const piece of await openBlob(found.sha256)) pieces.push(piece);
    return joinBytes(pieces);
  };
}

/** One hash of all files that a file is read with, for the key of its record, the same wherever the folder lies; empty where there are none. */
export function besideHash(name: string, blobs: readonly BesideBlob[]): string {
  if (blobs.length === 0) return '';
  const folder = folderOf(name);
  const lines = blobs.map(({ path, sha256 }) => JSON.stringify([path.startsWith(folder) ? path.slice(folder.length) : path, sha256])).sort();
  return createHash('sha256').update(lines.join('\n')).digest('hex');
}
