import { partLength, type UploadAnswer } from '@/lib/rules/upload-parts';
import { hashFile } from './hash-file';
import type { FileHashes } from './hash-parts';
import { patiently } from './patiently';
import type { RequestLanes } from './request-lanes';
import { requestJson, RequestError } from './request-json';
import { sendBytes } from './send-bytes';

/** A file's own address within its import, `…/files/<path>?asset=…`; the calls about its parts lie beside it. */
export interface UploadAddress {
  url: string;
  /** The import's address. */
  base: string;
  /** Name and what is said of the file, as a JSON call wants it. */
  said: Record<string, string>;
}

export interface FileUpload {
  address: UploadAddress;
  file: File;
  hashes: FileHashes;
  /** Bytes of a part that the hashes were made with. */
  partBytes: number;
  lanes: RequestLanes;
  onProgress: (sentBytes: number) => void;
  /** Told the address of what keeps the parts, until the file is whole. */
  onBegun: (address: string) => void;
  onWaiting: (isWaiting: boolean) => void;
  signal: AbortSignal;
}

const AGAIN_MS = 1000;

/** What a file's address says. */
export function uploadAddress(url: string): UploadAddress {
  const at = url.indexOf('/files/');
  const [path, query = ''] = url.slice(at + '/files/'.length).split('?');
  const name = path.split('/').map(decodeURIComponent).join('/');
  return { url, base: url.slice(0, at), said: { ...Object.fromEntries(new URLSearchParams(query)), name } };
}

/**
 * Sends one file: a small one at once, a larger one in parts, those first that are not there yet. Goes on by itself after a lost connection.
 * Errors: RequestError; AbortError when the signal ends it.
 */
export async function uploadFile(upload: FileUpload): Promise<void> {
  if (upload.file.size > upload.partBytes) return sendInParts(upload);
  const { address, file, hashes, lanes, signal, onProgress, onWaiting } = upload;
  const act = () => sendBytes({ url: address.url, body: file, sha256: hashes.sha256, onProgress, signal });
  await lanes.run(() => patiently(act, { signal, onWaiting }));
}

async function sendInParts(upload: FileUpload): Promise<void> {
  for (let turn = 1; ; turn++) {
    try {
      return await sendPartsOnce(upload);
    } catch (error) {
      // It ran out or was ended elsewhere: announced again, it goes on from what is there.
      if (!(error instanceof RequestError && error.status === 404) || turn === 3) throw error;
    }
  }
}

async function sendPartsOnce(upload: FileUpload): Promise<void> {
  const { address, file, hashes, partBytes, lanes, signal } = upload;
  const ask = <Answer>(path: string, body: unknown): Promise<Answer> => patiently(() => requestJson<Answer>(address.base + path, { method: 'POST', body, signal }), upload);
  const begun = await ask<UploadAnswer>('/uploads', { ...address.said, bytes: file.size, sha256: hashes.sha256, part_bytes: partBytes });
  if (begun.state === 'stored') return;
  upload.onBegun(`${address.base}/uploads/${begun.upload}`);
  // Begun elsewhere with parts of another size, by a script say, it goes on with those.
  const partHashes = begun.part_bytes === partBytes ? hashes.parts : (await hashFile(file, begun.part_bytes, () => undefined)).parts;
  const sent = new Map<number, number>(begun.parts.map((number) => [number, partLength(begun, number)]));
  const tell = () => upload.onProgress([...sent.values()].reduce((sum, bytes) => sum + bytes, 0));
  tell();
  const missing = Array.from({ length: begun.part_count }, (_, index) => index + 1).filter((number) => !sent.has(number));
  const failed = new AbortController();
  const stop = () => failed.abort();
  signal.addEventListener('abort', stop);
  try {
    const put = (number: number) => async () => {
      const start = (number - 1) * begun.part_bytes;
      const body = file.slice(start, start + partLength(begun, number));
      const note = (bytes: number) => {
        sent.set(number, bytes);
        tell();
      };
      if (failed.signal.aborted) throw new DOMException('stopped', 'AbortError');
      const url = `${address.base}/uploads/${begun.upload}/parts/${number}`;
      await patiently(() => sendBytes({ url, body, sha256: partHashes[number - 1], onProgress: note, signal: failed.signal }), { signal: failed.signal, onWaiting: upload.onWaiting });
      note(body.size);
    };
    let first: unknown = null;
    await Promise.all(
      missing.map((number) =>
        lanes.run(put(number)).catch((error: unknown) => {
          first ??= error;
          failed.abort();
        }),
      ),
    );
    if (first !== null) throw first;
  } finally {
    signal.removeEventListener('abort', stop);
  }
  for (;;) {
    const ended = await ask<UploadAnswer>(`/uploads/${begun.upload}/complete`, address.said);
    if (ended.state === 'stored') return;
    await new Promise((resolve) => setTimeout(resolve, AGAIN_MS));
  }
}
