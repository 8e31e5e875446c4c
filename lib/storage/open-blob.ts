import { createHash } from 'node:crypto';
import { pipeline, Transform, type Readable } from 'node:stream';
import { blobKey, disk } from './disk';
import { isTransientStorageFault } from './storage-fault';

/** Waits before the second, third and fourth try, milliseconds. */
const PAUSES_MS = [250, 1000, 4000];

/**
 * The bytes with this SHA-256 (64 lower-case hex digits) as a stream that holds itself to them: bytes that do not have the hash, or that
 * end early, make the stream fail at its end, so nothing read from it counts before it ended well. A storage that is not reached is tried
 * again with ever longer pauses; what breaks off later fails the stream with a fault that `isTransientStorageFault` knows. Destroying the
 * stream closes what it reads.
 */
export async function openBlob(sha256: string): Promise<Readable> {
  const source = await openPatiently(blobKey(sha256));
  const hash = createHash('sha256');
  const held = new Transform({
    transform(chunk: Buffer, _encoding, done) {
      hash.update(chunk);
      done(null, chunk);
    },
    flush(done) {
      const found = hash.digest('hex');
      done(found === sha256 ? null : new Error(`The stored bytes of ${sha256} have the SHA-256 ${found}.`));
    },
  });
  // The fault reaches the reader through the stream itself; pipeline destroys the source when the reader stops.
  pipeline(source, held, () => undefined);
  return held;
}

async function openPatiently(key: string): Promise<Readable> {
  for (const pause of PAUSES_MS) {
    try {
      return await (await disk()).getStream(key);
    } catch (error) {
      if (!isTransientStorageFault(error)) throw error;
      await new Promise((resolve) => setTimeout(resolve, pause));
    }
  }
  return (await disk()).getStream(key);
}
