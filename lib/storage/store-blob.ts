import { createHash, randomUUID } from 'node:crypto';
import { mkdir, open, rename, rm } from 'node:fs/promises';
import path from 'node:path';
import type { ReadableStream } from 'node:stream/web';
import { config } from '@/lib/config';
import { StudioError } from '@/lib/rules/studio-error';
import { blobKey, disk, uploadsFolder } from './disk';

export interface StoredBlob {
  sha256: string;
  byteSize: number;
}

export interface StoreOptions {
  /** Refused as too_large beyond this many bytes. */
  maxBytes: number;
  /** What the sender says the bytes' SHA-256 is (lower-case hex); other bytes are refused as bad_input. */
  expectedSha256?: string | null;
}

/**
 * Streams bytes into storage under their own hash. They go to a temporary file while they are hashed and counted, are
 * flushed to the volume, and only then get their name; a reader never sees half a file. Bytes that are there already are
 * not stored again. Whatever goes wrong, an abort by the sender included, the temporary file is removed.
 */
export async function storeBlob(source: ReadableStream<Uint8Array> | AsyncIterable<Uint8Array> | null, options: StoreOptions): Promise<StoredBlob> {
  await mkdir(uploadsFolder(), { recursive: true });
  const temporary = path.join(uploadsFolder(), randomUUID());
  try {
    const stored = await writeHashed(temporary, source, options.maxBytes);
    if (options.expectedSha256 && options.expectedSha256 !== stored.sha256) {
      throw new StudioError('bad_input', `The bytes that arrived have the SHA-256 ${stored.sha256}, not the one that was announced. Send the file again.`, { field: 'x-content-sha256' });
    }
    const key = blobKey(stored.sha256);
    if (await disk().exists(key)) return stored;
    const target = path.join(config().filesFolder, key);
    await mkdir(path.dirname(target), { recursive: true });
    await rename(temporary, target);
    return stored;
  } finally {
    await rm(temporary, { force: true });
  }
}

async function writeHashed(temporary: string, source: AsyncIterable<Uint8Array> | null, maxBytes: number): Promise<StoredBlob> {
  const hash = createHash('sha256');
  let byteSize = 0;
  const file = await open(temporary, 'wx');
  try {
    for await (const chunk of untilBroken(source)) {
      byteSize += chunk.byteLength;
      if (byteSize > maxBytes) throw new StudioError('too_large', `The file is larger than ${maxBytes} bytes, the most that one file may have here.`);
      hash.update(chunk);
      await file.writeFile(chunk);
    }
    await file.sync();
  } finally {
    await file.close();
  }
  return { sha256: hash.digest('hex'), byteSize };
}

/** The sender's bytes; a sender that goes away is their affair and no fault of ours. */
async function* untilBroken(source: AsyncIterable<Uint8Array> | null): AsyncIterable<Uint8Array> {
  try {
    if (source) yield* source;
  } catch {
    throw new StudioError('bad_request', 'The upload broke off before its end. Send the file again.');
  }
}
