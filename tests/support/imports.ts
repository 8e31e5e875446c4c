import type { ActorContext } from '@/lib/context';
import { getImport } from '@/lib/imports/get-import';
import { openImport } from '@/lib/imports/open-import';
import { putImportFile } from '@/lib/imports/put-import-file';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import measureFile from '@/lib/jobs/engine-thread';
import type { JobTools } from '@/lib/jobs/handlers/import-files';
import type { ImportDetail } from '@/lib/rules/import-answer';
import { openImportInput, type OpenImportInput } from '@/lib/rules/inputs/open-import';
import { putImportFileInput } from '@/lib/rules/inputs/put-import-file';
import { parseInput } from '@/lib/rules/parse-input';

/** The engine in the test's own thread. */
export const ownThread: JobTools['engine'] = { measure: (file) => measureFile({ ...file, idleThreads: 0, port: null }) };

export interface SentFile {
  /** The file's text, or its bytes. */
  text: string | Uint8Array<ArrayBuffer>;
  asset?: string;
  version?: string;
  outside_id?: string;
  category?: string;
}

/** Opens an import and puts the files into it. Answers its id. */
export async function openWith(context: ActorContext, show: string, files: Record<string, SentFile['text'] | SentFile>, options: Partial<OpenImportInput> = {}): Promise<string> {
  const { id } = await openImport(context, parseInput(openImportInput, { show, ...options }));
  for (const [name, sent] of Object.entries(files)) {
    const { text, ...said } = typeof sent === 'string' || sent instanceof Uint8Array ? { text: sent } : sent;
    const request = new Request('http://127.0.0.1:3000/', { method: 'PUT', body: text });
    await putImportFile(context, parseInput(putImportFileInput, { show, import: id, name, ...said }), request);
  }
  return id;
}

/** The whole way: open, upload, submit, measure here. */
export async function importFiles(context: ActorContext, show: string, files: Record<string, SentFile['text'] | SentFile>, options: Partial<OpenImportInput> = {}): Promise<ImportDetail> {
  const id = await openWith(context, show, files, options);
  await submitImport(context, { show, import: id });
  await drainQueue(context.db, ownThread);
  return getImport(context, { show, import: id });
}

