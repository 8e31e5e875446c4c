import type { Database } from '@/db/client';
import { log } from '@/lib/log';
import { sendDigests } from '@/lib/notices/send-digests';

const EVERY_MS = 30_000;

/** Looks twice a minute whether digests are due, until stopped. */
export function runDigestSweep(db: Database): { stop(): Promise<void> } {
  let current: Promise<void> | null = null;
  const sweep = async (): Promise<void> => {
    try {
      const sent = await sendDigests(db, new Date());
      if (sent > 0) log.info({ sent }, 'digests are queued');
    } catch (error) {
      log.warn({ err: error }, 'digests could not be queued');
    }
  };
  const begin = () => {
    current ??= sweep().finally(() => (current = null));
  };
  const timer = setInterval(begin, EVERY_MS);
  begin();
  return {
    async stop() {
      clearInterval(timer);
      await current;
    },
  };
}
