import { existsSync } from 'node:fs';
import path from 'node:path';
import { Piscina } from 'piscina';
import { config } from '@/lib/config';
import type { MeshTask } from '@/lib/jobs/mesh-thread';

/** Seconds after which a mesh is given up: it would hold the only thread. */
const LONGEST_S = 120;

let pool: Piscina<MeshTask, { sha256: string; byteSize: number }> | null = null;

/** Makes a mesh beside the event loop: one thread, started on demand, since pages wait for it and numbers do not. */
export function makeMeshInThread(task: MeshTask): Promise<{ sha256: string; byteSize: number }> {
  pool ??= startPool();
  return pool.run(task, { signal: AbortSignal.timeout(LONGEST_S * 1000) });
}

/** In production the thread is bundled beside the worker's; in tests its source runs as it is. */
function startPool(): Piscina<MeshTask, { sha256: string; byteSize: number }> {
  const bundled = path.join(/* turbopackIgnore: true */ process.cwd(), 'dist', 'worker', 'mesh-thread.mjs');
  const isBundled = config().isProduction && existsSync(bundled);
  return new Piscina({
    filename: isBundled ? bundled : path.join(/* turbopackIgnore: true */ process.cwd(), 'lib', 'jobs', 'mesh-thread.ts'),
    execArgv: isBundled ? [] : ['--import', 'tsx'],
    minThreads: 0,
    maxThreads: 1,
    maxQueue: 64,
    idleTimeout: 20_000,
    resourceLimits: { maxOldGenerationSizeMb: 4096 },
  });
}
