import { sha256 } from '@noble/hashes/sha2.js';
import { bytesToHex } from '@noble/hashes/utils.js';

/** A file's SHA-256 and those of its parts, in order; lower-case hex. An empty file has no parts. */
export interface FileHashes {
  sha256: string;
  parts: string[];
}

/**
 * Hashes a file part by part, so that no more than one part is held in memory. The browser's own digest takes whole buffers only, so the
 * file's hash is computed in script; the parts' are the browser's where the page is trusted with it (it is not on plain HTTP from afar).
 * @param onProgress told the bytes hashed so far
 * Errors: what reading the file throws (it was moved, changed or taken away).
 */
export async function hashParts(file: Blob, partBytes: number, onProgress: (hashedBytes: number) => void): Promise<FileHashes> {
  const whole = sha256.create();
  const parts: string[] = [];
  for (let start = 0; start < file.size; start += partBytes) {
    const bytes = new Uint8Array(await file.slice(start, start + partBytes).arrayBuffer());
    const part = partHash(bytes);
    whole.update(bytes);
    parts.push(await part);
    onProgress(start + bytes.length);
  }
  return { sha256: bytesToHex(whole.digest()), parts };
}

async function partHash(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const { subtle } = globalThis.crypto as Partial<Crypto>;
  return bytesToHex(subtle ? new Uint8Array(await subtle.digest('SHA-256', bytes)) : sha256(bytes));
}
