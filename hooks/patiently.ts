import { RequestError } from './request-json';

interface Patience {
  signal: AbortSignal;
  /** Told when the server is not reached and it is waited for, and when it goes on. */
  onWaiting: (isWaiting: boolean) => void;
}

const FIRST_MS = 500;
const LONGEST_MS = 30_000;
/** A server that answers with faults is not asked for ever; one that is not reached is. */
const MOST_FAULTS = 8;

const isLost = (error: unknown): boolean => error instanceof RequestError && error.status === 0 && error.code === 'not_reached';
const isPassing = (error: unknown): boolean => error instanceof RequestError && (error.status === 429 || (error.status >= 500 && error.status !== 507));

/**
 * Does one request, again and again while the connection is lost or the server busy, with pauses that double up to half a minute; the
 * browser's word that the network is back ends a pause. Errors: the last one; AbortError when the signal ends it.
 */
export async function patiently<Answer>(act: () => Promise<Answer>, { signal, onWaiting }: Patience): Promise<Answer> {
  let faults = 0;
  for (let turn = 0; ; turn++) {
    try {
      const answer = await act();
      if (turn > 0) onWaiting(false);
      return answer;
    } catch (error) {
      if (signal.aborted || !(isLost(error) || isPassing(error))) throw error;
      if (isPassing(error) && ++faults === MOST_FAULTS) throw error;
      onWaiting(true);
      // Spread, so that thousands of browsers do not come back in one moment.
      await pause(Math.min(LONGEST_MS, FIRST_MS * 2 ** turn) * (0.75 + Math.random() / 2), signal);
    }
  }
}

function pause(ms: number, signal: AbortSignal): Promise<void> {
  return new Promise((resolve, reject) => {
    const end = () => {
      clearTimeout(timer);
      globalThis.removeEventListener('online', goOn);
      signal.removeEventListener('abort', stop);
    };
    const goOn = () => {
      end();
      resolve();
    };
    const stop = () => {
      end();
      reject(new DOMException('stopped', 'AbortError'));
    };
    const timer = setTimeout(goOn, ms);
    globalThis.addEventListener('online', goOn);
    signal.addEventListener('abort', stop);
  });
}
