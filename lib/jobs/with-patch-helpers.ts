import { Worker } from 'node:worker_threads';
import { setPatchTeam } from '@/lib/engine/kernel/patch-block';
import { dismissTeam, teamKernels, teamMemory } from '@/lib/engine/kernel/patch-team';
import { threadFile } from './thread-file';

/** Faces from which a cage is worth the start of another thread, some hundredths of a second. */
export const LARGE_CAGE_FACES = 50_000;

/**
 * Does `work` with so many threads beside this one that compute patches, 0 for none. It does not wait for them: each joins when it has started, and the
 * numbers are the same to the last bit however many there are. They end by themselves once `work` has ended.
 */
export function withPatchHelpers<T>(helpers: number, work: () => T): T {
  if (helpers < 1) return work();
  const memory = teamMemory();
  const { filename, execArgv } = threadFile('patch-thread');
  for (let i = 0; i < helpers; i++) {
    const worker = new Worker(filename, { workerData: memory, execArgv });
    // One that cannot start is no fault: the others do its share.
    worker.on('error', () => undefined);
    worker.unref();
  }
  setPatchTeam(teamKernels(memory));
  try {
    return work();
  } finally {
    setPatchTeam(null);
    dismissTeam(memory);
  }
}
