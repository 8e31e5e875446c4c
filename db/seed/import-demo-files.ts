import { setTimeout as wait } from 'node:timers/promises';
import type { ActorContext } from '@/lib/context';
import { getImport } from '@/lib/imports/get-import';
import { openImport } from '@/lib/imports/open-import';
import { putImportFile } from '@/lib/imports/put-import-file';
import { submitImport } from '@/lib/imports/submit-import';
import { drainQueue } from '@/lib/jobs/drain-queue';
import measureFile from '@/lib/jobs/engine-thread';
import type { ImportDetail } from '@/lib/rules/import-answer';
import type { DemoFile } from './cages/demo-files';

const LONGEST_WAIT_MS = 5 * 60_000;

/**
 * Brings files in as a script would: open, upload, submit, wait. Measures in this process what no worker has taken, so that
 * it comes to an end with a worker beside it and without one. Errors: an import that does not end in five minutes.
 */
export async function importDemoFiles(context: ActorContext, show: string, files: readonly DemoFile[]): Promise<ImportDetail> {
  const { id } = await openImport(context, { show });
  for (const { path, text } of files) {
    const request = new Request('http://127.0.0.1/', { method: 'PUT', body: text });
    await putImportFile(context, { show, import: id, name: path }, request);
  }
  await submitImport(context, { show, import: id });
  const deadline = Date.now() + LONGEST_WAIT_MS;
  while (Date.now() < deadline) {
    await drainQueue(context.db, { measure: (file) => measureFile({ ...file, idleThreads: 0, port: null }) });
    const detail = await getImport(context, { show, import: id });
    if (detail.state === 'done') return detail;
    await wait(200);
  }
  throw new Error(`The demo's import ${id} did not end in ${LONGEST_WAIT_MS / 1000} s.`);
}
