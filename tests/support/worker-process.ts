import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../../', import.meta.url));

export interface WorkerProcess {
  pid: number;
  /** What it wrote so far, log lines and faults. */
  output: () => string;
  /** Sends the signal and waits for the end; answers the exit code, null after a kill. */
  end: (signal: 'SIGKILL' | 'SIGTERM') => Promise<number | null>;
}

const running = new Set<ChildProcess>();

/** Starts the worker as a process of its own on the test's database and folder. */
export function startWorkerProcess(): WorkerProcess {
  const env = { ...process.env, LOG_LEVEL: 'info', NODE_ENV: 'production' } satisfies NodeJS.ProcessEnv;
  const child = spawn(process.execPath, ['--import', 'tsx', 'lib/jobs/worker.ts'], { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] });
  running.add(child);
  let written = '';
  child.stdout.on('data', (chunk: Buffer) => (written += chunk.toString()));
  child.stderr.on('data', (chunk: Buffer) => (written += chunk.toString()));
  return {
    pid: child.pid!,
    output: () => written,
    async end(signal) {
      if (child.exitCode === null && child.signalCode === null) {
        const ended = once(child, 'exit');
        child.kill(signal);
        await ended;
      }
      running.delete(child);
      return child.exitCode;
    },
  };
}

/** For afterEach: nothing that a failing test started outlives it. */
export function killWorkers(): void {
  for (const child of running) child.kill('SIGKILL');
  running.clear();
}
