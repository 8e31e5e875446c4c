import type { Readable } from 'node:stream';
import { blobKey, disk } from './disk';

/** The bytes with this SHA-256 as a stream; the stream fails when they are not in storage. */
export function readBlob(sha256: string): Promise<Readable> {
  return disk().getStream(blobKey(sha256));
}
