import type { Database } from '@/db/client';
import { config } from '@/lib/config';
import { log } from '@/lib/log';
import { sendWaitingMails } from './send-waiting-mails';

const EVERY_MS = 2_000;
const SLOWEST_MS = 5 * 60_000;

/** Sends waiting messages until stopped: every two seconds, ever less often while the mail server refuses. */
export function runMailSweep(db: Database): { stop(): Promise<void> } {
  if (!config().smtpUrl) return { stop: async () => undefined };
  let pause = EVERY_MS;
  let isEnding = false;
  let timer: NodeJS.Timeout;
  let current: Promise<void> = Promise.resolve();
  const sweep = async () => {
    try {
      const outcome = await sendWaitingMails(db);
      pause = outcome.reached && outcome.waiting === 0 ? EVERY_MS : Math.min(pause * 2, SLOWEST_MS);
    } catch (error) {
      log.warn({ err: error }, 'messages could not be sent');
      pause = Math.min(pause * 2, SLOWEST_MS);
    }
    if (!isEnding) timer = setTimeout(begin, pause);
  };
  const begin = () => {
    current = sweep();
  };
  timer = setTimeout(begin, EVERY_MS);
  return {
    async stop() {
      isEnding = true;
      clearTimeout(timer);
      await current;
    },
  };
}
