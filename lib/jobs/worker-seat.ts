import { randomUUID } from 'node:crypto';
import os from 'node:os';
import { sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import type { Seat } from '@/lib/imports/claim-turn';
import { config } from '@/lib/config';
import { log } from '@/lib/log';
import { MemoryLedger } from './memory-ledger';

const EVERY_MS = 5_000;
/** A worker that was silent for this long is not counted on; after a day it is forgotten. */
const SILENT_S = 30;

/** Half of what the machine, or the container that this runs in, has: the database and the web server may live there too. */
export function measuringMemory(): number {
  const { workerMemory } = config();
  if (workerMemory !== null) return workerMemory;
  const constrained = process.constrainedMemory();
  const total = os.totalmem();
  return Math.floor((constrained > 0 && constrained < total ? constrained : total) / 2);
}

/** A seat of this process that no other process is told of, for a script that does the waiting work by itself. */
export function ownSeat(): Seat {
  return { worker: workerName(), memory: new MemoryLedger(measuringMemory()), isRoomiest: true };
}

const workerName = (): string => config().workerName ?? `${os.hostname()} ${process.pid}`;

/** Takes a seat at the queue and tells the others, until it is left: which workers there are, and which of them has most room, is seen by all. */
export async function takeSeat(db: Database, threads: number): Promise<{ seat: Seat; leave: () => Promise<void> }> {
  const id = randomUUID();
  const seat = ownSeat();
  const speak = async () => {
    await db.execute(sql`
      insert into workers (id, name, threads, memory_bytes) values (${id}, ${seat.worker}, ${threads}, ${seat.memory.budget})
      on conflict (id) do update set seen_at = now()`);
    const { rows } = await db.execute<{ most: string }>(sql`select max(memory_bytes) as most from workers where seen_at > now() - make_interval(secs => ${SILENT_S})`);
    seat.isRoomiest = seat.memory.budget >= Number(rows[0].most);
    await db.execute(sql`delete from workers where seen_at < now() - interval '1 day'`);
  };
  await speak();
  const timer = setInterval(() => void speak().catch((error: unknown) => log.warn({ err: error }, 'this worker could not say that it is there')), EVERY_MS);
  return {
    seat,
    async leave() {
      clearInterval(timer);
      await db.execute(sql`delete from workers where id = ${id}`).catch(() => undefined);
    },
  };
}
