import { availableParallelism } from 'node:os';
import { MessageChannel } from 'node:worker_threads';
import { Piscina } from 'piscina';
import { config } from '@/lib/config';
import type { MeasureOutcome, MeasureTask } from './engine-thread';
import { MemoryFault } from './passing-fault';
import { threadFile } from './thread-file';

/** What measures files beside the event loop, so that heartbeats go on during a long solve. */
export interface EnginePool {
  threads: number;
  measure(file: Pick<MeasureTask, 'name' | 'sha256' | 'options' | 'space' | 'beside'>, onMeasuring?: () => void, signal?: AbortSignal): Promise<MeasureOutcome>;
  close(): Promise<void>;
}

const isOutOfMemory = (error: unknown): boolean => error instanceof Error && 'code' in error && error.code === 'ERR_WORKER_OUT_OF_MEMORY';

/** An array that could not be made ends the task alone, not its thread. */
const ranOut = (outcome: MeasureOutcome): boolean => !outcome.ok && outcome.code === 'measuring_failed' && /allocation failed/i.test(outcome.message);

const TOO_COMPLEX: MeasureOutcome = { ok: false, code: 'too_complex', message: 'the file needs more memory than a measuring thread may have', line: null, column: null, excerpt: null };

/** Memory ran out: for good where the file had it for itself, else it is tried again alone. */
function tooMuch(busy: number): MeasureOutcome {
  if (busy > 1) throw new MemoryFault();
  return TOO_COMPLEX;
}

/** Starts threads on demand; they end when they are idle for a while. */
export function startEnginePool(threads = config().engineThreads ?? availableParallelism()): EnginePool {
  const pool = new Piscina<MeasureTask, MeasureOutcome>({
    ...threadFile('engine-thread'),
    minThreads: 0,
    maxThreads: threads,
    idleTimeout: 30_000,
  });
  let busy = 0;
  return {
    threads,
    async measure(file, onMeasuring, signal) {
      const { port1, port2 } = new MessageChannel();
      port1.on('message', () => onMeasuring?.());
      port1.unref();
      busy++;
      try {
        // What other files leave idle may help with this one, should it be large.
        const outcome = await pool.run({ ...file, idleThreads: Math.max(0, threads - busy), port: port2 }, { transferList: [port2], signal });
        return ranOut(outcome) ? tooMuch(busy) : outcome;
      } catch (error) {
        if (!isOutOfMemory(error)) throw error;
        return tooMuch(busy);
      } finally {
        busy--;
        port1.close();
      }
    },
    close: () => pool.destroy(),
  };
}
