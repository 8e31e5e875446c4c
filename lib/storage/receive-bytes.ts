import { createHash } from 'node:crypto';
import type { ReadableStream } from 'node:stream/web';
import { config } from '@/lib/config';
import { byteWords } from '@/lib/rules/byte-words';
import { StudioError } from '@/lib/rules/studio-error';
import { receiveIntoFolder } from './receive-into-folder';
import { asStudioError } from './storage-fault';

export type ByteSource = ReadableStream<Uint8Array> | AsyncIterable<Uint8Array> | null;

export interface ReceiveOptions {
  /** Refused as too_large beyond this many bytes. */
  maxBytes: number;
  /** What the sender says the bytes' SHA-256 is (lower-case hex); other bytes are refused as bad_input. */
  expectedSha256?: string | null;
  /** Fewer bytes than that are refused as bad_request: the sender broke off. */
  expectedBytes?: number | null;
}

/** Bytes that arrived whole and lie in storage under no name yet. */
export interface Received {
  /** Lower-case hex. */
  sha256: string;
  byteSize: number;
  /** Gives them their name, at once and whole; what is there under it already stays. */
  place(key: string): Promise<void>;
  /** Removes what was not placed. Called whatever happened. */
  discard(): Promise<void>;
}

/** Where arriving bytes go meanwhile: a folder's temporary file, or memory and parts of a bucket. */
export interface Landing {
  write(chunk: Uint8Array): Promise<void>;
  /** All came: makes sure that they last. */
  close(sha256: string): Promise<void>;
  place(key: string): Promise<void>;
  discard(): Promise<void>;
}

/**
 * Takes bytes into the storage while hashing and counting them, and holds them against what was announced. Nothing has a name until
 * `place`, so a reader never sees half a file; whatever goes wrong, an abort by the sender included, nothing is left.
 */
export async function receiveBytes(source: ByteSource, options: ReceiveOptions): Promise<Received> {
  let landing: Landing | null = null;
  try {
    landing = config().s3 ? (await import('./receive-into-s3')).receiveIntoS3() : await receiveIntoFolder();
    const { sha256, byteSize } = await take(source, landing, options);
    await landing.close(sha256);
    const landed = landing;
    return { sha256, byteSize, place: (key) => landed.place(key).catch(rethrow), discard: () => landed.discard() };
  } catch (error) {
    await landing?.discard().catch(() => undefined);
    throw asStudioError(error);
  }
}

const rethrow = (error: unknown): never => {
  throw asStudioError(error);
};

async function take(source: ByteSource, landing: Landing, { maxBytes, expectedSha256, expectedBytes }: ReceiveOptions): Promise<{ sha256: string; byteSize: number }> {
  const hash = createHash('sha256');
  let byteSize = 0;
  for await (const chunk of untilBroken(source)) {
    byteSize += chunk.byteLength;
    if (byteSize > maxBytes) throw new StudioError('too_large', `More than ${byteWords(maxBytes)} (${maxBytes} bytes) came, the most that is taken here.`);
    hash.update(chunk);
    await landing.write(chunk);
  }
  if (expectedBytes != null && byteSize !== expectedBytes) throw new StudioError('bad_request', `${byteSize} bytes arrived, not the ${expectedBytes} that were announced. Send them again.`);
  const sha256 = hash.digest('hex');
  if (expectedSha256 && expectedSha256 !== sha256) {
    throw new StudioError('bad_input', `The bytes that arrived have the SHA-256 ${sha256}, not the one that was announced. Send the file again.`, { field: 'x-content-sha256' });
  }
  return { sha256, byteSize };
}

/** The sender's bytes; a sender that goes away is their affair and no fault of ours. What the storage itself fails to read stays its fault. */
async function* untilBroken(source: ByteSource): AsyncIterable<Uint8Array> {
  try {
    if (source) yield* source;
  } catch (error) {
    if (error instanceof StudioError) throw error;
    throw new StudioError('bad_request', 'The upload broke off before its end. Send the file again.');
  }
}
