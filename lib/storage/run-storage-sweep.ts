import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { log } from '@/lib/log';
import { sweepOwnFolder } from './sweep-own-folder';
import { sweepStorage } from './sweep-storage';

const LOOK_EVERY_MS = 10 * 60_000;
const SWEEP_EVERY_MIN = 55;

/** Whether this process is the one to sweep now; of all workers one is, about every hour. */
async function isOurTurn(db: Database): Promise<boolean> {
  const { rows } = await db.execute(sql`
    insert into storage_usage (scope, bytes) values ('sweep', 0)
    on conflict (scope) do update set counted_at = now() where storage_usage.counted_at < now() - make_interval(mins => ${SWEEP_EVERY_MIN})
    returning scope`);
  return rows.length > 0;
}

/** Sweeps this machine's own folder, and the storage about every hour, until stopped. */
export function runStorageSweep(db: Database): { stop(): Promise<void> } {
  let current: Promise<void> = Promise.resolve();
  const sweep = async () => {
    try {
      const own = await sweepOwnFolder();
      if (own > 0) log.info({ files: own }, 'unfinished files of this machine were removed');
      if (!(await isOurTurn(db))) return;
      const swept = await sweepStorage(db);
      if (Object.values(swept).some((count) => count > 0)) log.info(swept, 'the storage was swept');
    } catch (error) {
      log.warn({ err: error }, 'the storage could not be swept');
    }
  };
  const begin = () => {
    current = current.then(sweep);
  };
  begin();
  const timer = setInterval(begin, LOOK_EVERY_MS);
  return {
    async stop() {
      clearInterval(timer);
      await current;
    },
  };
}
