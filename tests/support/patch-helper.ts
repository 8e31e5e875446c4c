import { Worker, parentPort, workerData } from 'node:worker_threads';
import { helpTeam } from '@/lib/engine/kernel/patch-team';

// In the helper's own thread: it says that it is ready, then helps until it is dismissed.
if (parentPort !== null && workerData instanceof SharedArrayBuffer) {
  parentPort.postMessage('ready');
  helpTeam(workerData);
}

/** Starts a thread that helps the team with that memory; resolves once it has begun. */
export async function startHelper(memory: SharedArrayBuffer): Promise<Worker> {
  const start = `import('tsx/esm/api').then(({ register }) => { register(); return import(${JSON.stringify(import.meta.url)}); })`;
  const worker = new Worker(start, { eval: true, workerData: memory });
  await new Promise((resolve, reject) => worker.once('message', resolve).once('error', reject));
  return worker;
}
