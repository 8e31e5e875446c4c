import { createHash } from 'node:crypto';
import { createReadStream, openAsBlob, statSync } from 'node:fs';
import type { ActorContext } from '@/lib/context';

/** A file of a row: its text, or where a large one lies. */
export type BenchFile = { name: string; text: () => string } | { name: string; path: string };

/** Requests at once, as a browser has them. */
const LANES = 4;
const PART_BYTES = 8 * 2 ** 20;

/** Sends files into an open import as the browser does: small ones at once, a large one in parts with a hash each. */
export async function sendFiles(context: ActorContext, show: string, importId: string, files: readonly BenchFile[]): Promise<void> {
  const { putImportFile } = await import('@/lib/imports/put-import-file');
  const ref = { show, import: importId };
  await inLanes(files, async (file) => {
    if ('path' in file) return sendInParts(context, ref, file);
    await putImportFile(context, { ...ref, name: file.name }, new Request('http://127.0.0.1/', { method: 'PUT', body: file.text() }));
  });
}

async function sendInParts(context: ActorContext, ref: { show: string; import: string }, { name, path }: { name: string; path: string }): Promise<void> {
  const { announceUpload } = await import('@/lib/imports/announce-upload');
  const { putUploadPart } = await import('@/lib/imports/put-upload-part');
  const { completeUpload } = await import('@/lib/imports/complete-upload');
  const whole = createHash('sha256');
  for await (const chunk of createReadStream(path)) whole.update(chunk as Buffer);
  const { upload, part_count } = await announceUpload(context, { ...ref, name, bytes: statSync(path).size, sha256: whole.digest('hex'), part_bytes: PART_BYTES });
  if (upload === null) return;
  const blob = await openAsBlob(path);
  await inLanes(Array.from({ length: part_count }, (_, index) => index + 1), async (part) => {
    const bytes = new Uint8Array(await blob.slice((part - 1) * PART_BYTES, part * PART_BYTES).arrayBuffer());
    const headers = { 'x-content-sha256': createHash('sha256').update(bytes).digest('hex') };
    await putUploadPart(context, { ...ref, upload, part }, new Request('http://127.0.0.1/', { method: 'PUT', body: bytes, headers }));
  });
  for (;;) if ((await completeUpload(context, { ...ref, upload, name })).state === 'stored') return;
}

/** Runs the work of each, a few at a time, in their order. */
async function inLanes<Item>(items: readonly Item[], act: (item: Item) => Promise<void>): Promise<void> {
  let next = 0;
  const lane = async () => {
    while (next < items.length) await act(items[next++]);
  };
  await Promise.all(Array.from({ length: Math.min(LANES, items.length) }, lane));
}
