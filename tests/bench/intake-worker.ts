import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { readdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const jobs = fileURLToPath(new URL('../../lib/jobs/', import.meta.url));

/** The worker with its threads as production runs them, in a folder of the checkout, where they find the packages. */
export async function bundleWorker(folder: string): Promise<void> {
  const entries = readdirSync(jobs).filter((name) => name === 'worker.ts' || name.endsWith('-thread.ts'));
  await build({
    entryPoints: entries.map((name) => path.join(jobs, name)), outdir: folder, outbase: jobs, outExtension: { '.js': '.mjs' }, bundle: true, platform: 'node', target: 'node20', format: 'esm',
    tsconfig: fileURLToPath(new URL('../../tsconfig.json', import.meta.url)), packages: 'external', logLevel: 'error',
  });
}

export interface BenchWorker {
  /** Most memory that it held so far, bytes. */
  peakBytes: () => number;
  stop: () => Promise<void>;
}

/** Starts a worker process and waits until it is ready. Fails with what it wrote where it ends instead. */
export async function startBenchWorker(folder: string, threads: number): Promise<BenchWorker> {
  const env = { ...process.env, NODE_ENV: 'production', LOG_LEVEL: 'info', WEIGHHOUSE_ENGINE_THREADS: String(threads) } satisfies NodeJS.ProcessEnv;
  const child = spawn(process.execPath, [path.join(folder, 'worker.mjs')], { env, stdio: ['ignore', 'pipe', 'pipe'] });
  let written = '';
  const ended = once(child, 'exit');
  await new Promise<void>((resolve, reject) => {
    for (const stream of [child.stdout, child.stderr]) {
      stream.on('data', (chunk: Buffer) => {
        written += chunk.toString();
        if (written.includes('worker is ready')) resolve();
      });
    }
    child.once('exit', () => reject(new Error(`The worker ended before it was ready.\n${written}`)));
  });
  return {
    peakBytes: () => peakBytes(child.pid!),
    async stop() {
      if (child.exitCode === null) child.kill('SIGTERM');
      await ended;
      if (child.exitCode !== 0) throw new Error(`The worker ended with ${child.exitCode}.\n${written}`);
    },
  };
}

/** Most memory that a process held, bytes, by the system's own count; NaN where the system has none. */
export function peakBytes(pid: number | 'self'): number {
  try {
    return 1024 * Number(/^VmHWM:\s*(\d+) kB$/m.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))?.[1]);
  } catch {
    return NaN;
  }
}

/** Lets this process' peak begin afresh, so that a row has its own. */
export function forgetPeak(): void {
  try {
    writeFileSync('/proc/self/clear_refs', '5');
  } catch {
    // Not on this system: then the peak is that of all rows so far.
  }
}
