import { hashParts, type FileHashes } from './hash-parts';
import type { HashNews, HashOrder } from './hash-worker';

interface Asked {
  onProgress: (hashedBytes: number) => void;
  resolve: (hashes: FileHashes) => void;
  reject: (error: Error) => void;
}

const asked = new Map<number, Asked>();
let worker: Worker | null = null;
let next = 1;

/** What was hashed once, for the preview say, is not again while the page holds the file. */
const known = new WeakMap<Blob, { partBytes: number; hashes: Promise<FileHashes> }>();

/** Hashes a file away from the page's own thread, once. Errors: an Error when the browser cannot read it. */
export function hashFile(file: Blob, partBytes: number, onProgress: (hashedBytes: number) => void): Promise<FileHashes> {
  const held = known.get(file);
  if (held?.partBytes === partBytes) return held.hashes;
  const hashes = hashAway(file, partBytes, onProgress);
  known.set(file, { partBytes, hashes });
  hashes.catch(() => known.delete(file));
  return hashes;
}

function hashAway(file: Blob, partBytes: number, onProgress: (hashedBytes: number) => void): Promise<FileHashes> {
  if (typeof Worker === 'undefined') return hashParts(file, partBytes, onProgress);
  worker ??= begin();
  const order: HashOrder = { id: next++, file, partBytes };
  const answer = new Promise<FileHashes>((resolve, reject) => asked.set(order.id, { onProgress, resolve, reject }));
  worker.postMessage(order);
  return answer;
}

function begin(): Worker {
  const made = new Worker(new URL('./hash-worker.ts', import.meta.url), { type: 'module', name: 'weighhouse hashes' });
  made.onmessage = ({ data }: MessageEvent<HashNews>) => {
    const one = asked.get(data.id);
    if (!one) return;
    if ('hashedBytes' in data) return one.onProgress(data.hashedBytes);
    asked.delete(data.id);
    if ('hashes' in data) one.resolve(data.hashes);
    else one.reject(new Error(data.fault));
  };
  // One that cannot be loaded (an old tab after an update) hashes nothing; the next file begins another.
  made.onerror = () => {
    worker = null;
    for (const one of asked.values()) one.reject(new Error('The worker was lost.'));
    asked.clear();
  };
  return made;
}
