import { randomUUID } from 'node:crypto';
import { sql } from 'drizzle-orm';
import type { Database, Transaction } from '@/db/client';
import { expectedMeasureBytes, mostFaces } from '@/lib/jobs/measure-budget';
import type { MemoryLedger } from '@/lib/jobs/memory-ledger';
import { inTurn, nowOf, type Lane, type Turn } from '@/lib/rules/fair-turns';
import { LEASE_S } from './lease';
import { notifyImport } from './notify-import';
import { pickFiles, workOf, type Candidate } from './pick-files';

/** One claim at a time in the studio, some milliseconds each: whose turn it is, and which file of an asset comes first, are questions about all of them. */
const CLAIM_LOCK = 7_305_120;

/** Files of an import that are looked through at first; more only where all of these are held up. */
const WINDOW = 400;

/** Who asks for work. */
export interface Seat {
  /** As people see it. */
  worker: string;
  memory: MemoryLedger;
  /** Whether no worker that is at work has a larger budget: then files that are too large for any are left to this one, alone. */
  isRoomiest: boolean;
}

export interface ClaimedFile {
  id: string;
  importId: string;
  asset: string | null;
  /** Bytes of memory that measuring it takes. */
  memory: number;
}

/** The files of a turn, in order, held under one name. */
export interface ClaimedTurn {
  holder: string;
  files: ClaimedFile[];
}

/**
 * Takes the next files that wait: of the show that was given the least work, of its small or its large ones, whichever were given less, in their order, as
 * many as a turn takes and as the process has room for. What they take of its memory is set aside under the turn's name. Null when there is nothing to take.
 */
export function claimTurn(db: Database, seat: Seat): Promise<ClaimedTurn | null> {
  return seat.memory.inOrder(async () => {
    const turn = await db.transaction((tx) => claimIn(tx, seat));
    if (turn === null) return null;
    for (const file of turn.files) seat.memory.forget(file.id);
    seat.memory.hold(turn.holder, Math.max(...turn.files.map((file) => file.memory)));
    return turn;
  });
}

async function claimIn(tx: Transaction, seat: Seat): Promise<ClaimedTurn | null> {
  await tx.execute(sql`select pg_advisory_xact_lock(${CLAIM_LOCK})`);
  const turns = await turnsOfWaiting(tx);
  await forgetTaken(tx, seat.memory);
  for (const { name: show, begins } of inTurn([...turns.shows], (id) => turns.of(id, 'all'), turns.now)) {
    const candidates = await candidatesOf(tx, show, seat);
    const lanes = (['small', 'large'] as const).flatMap((lane) => turns.of(show, lane) ?? []);
    for (const { name: lane, begins: laneBegins } of inTurn(['small', 'large'] as const, (one) => turns.of(show, one), nowOf(lanes))) {
      const { picked, tooLarge } = pickFiles(candidates, lane, (id) => seat.memory.roomFor(id));
      if (tooLarge !== null) seat.memory.passOver(tooLarge.id, tooLarge.memory);
      if (picked.length === 0) continue;
      const holder = randomUUID();
      await take(tx, picked, holder, seat.worker);
      const work = picked.reduce((sum, file) => sum + workOf(file), 0);
      await writeTurn(tx, show, 'all', { began: begins, ended: begins + work });
      await writeTurn(tx, show, lane, { began: laneBegins, ended: laneBegins + work });
      return { holder, files: picked.map(({ id, importId, asset, memory }) => ({ id, importId, asset, memory })) };
    }
  }
  return null;
}

interface TurnRow extends Record<string, unknown> {
  show_id: string;
  lane: Lane | null;
  began: string | null;
  ended: string | null;
  now: string;
}

/** Shows with files that could be taken, those that wait longest first, and the last turns of each. */
async function turnsOfWaiting(tx: Transaction): Promise<{ shows: Set<string>; now: number; of: (show: string, lane: Lane) => Turn | undefined }> {
  const { rows } = await tx.execute<TurnRow>(sql`
    select w.show_id, t.lane, t.began, t.ended, (select coalesce(max(began), 0) from queue_turns where lane = 'all') as now
    from (select i.show_id, min(i.submitted_at) as since from imports i
      where i.state in ('queued', 'running') and i.paused_at is null and exists (
        select 1 from import_files f where f.import_id = i.id and f.state = 'queued' and f.queued_at is not null and f.lease_by is null and (f.try_after is null or f.try_after <= now()))
      group by i.show_id) w
    left join queue_turns t on t.show_id = w.show_id
    order by w.since, w.show_id`);
  const turns = new Map(rows.filter((row) => row.lane !== null).map((row) => [`${row.show_id} ${row.lane}`, { began: Number(row.began), ended: Number(row.ended) }]));
  return { shows: new Set(rows.map((row) => row.show_id)), now: Number(rows.at(0)?.now ?? 0), of: (show, lane) => turns.get(`${show} ${lane}`) };
}

/** Room is kept for nobody who does not wait any more. */
async function forgetTaken(tx: Transaction, memory: MemoryLedger): Promise<void> {
  if (memory.keptFor === null) return;
  const { rows } = await tx.execute(sql`
    select 1 from import_files f join imports i on i.id = f.import_id
    where f.id = ${memory.keptFor} and f.state = 'queued' and f.lease_by is null and i.state in ('queued', 'running') and i.paused_at is null`);
  if (rows.length === 0) memory.forget(memory.keptFor);
}

interface FileRow extends Record<string, unknown> {
  id: string;
  import_id: string;
  name: string;
  asset: string | null;
  byte_size: string;
  faces: number | null;
  is_alone: boolean;
  is_out: boolean;
}

/**
 * Files of a show that have not ended, each import's in its order and the imports side by side, so that a small one is not behind a large one. A file whose
 * asset an earlier import still brings is left out: that one's comes first.
 */
async function candidatesOf(tx: Transaction, show: string, seat: Seat): Promise<Candidate[]> {
  for (let window = WINDOW; ; window *= 10) {
    const { rows } = await tx.execute<FileRow>(sql`
      with active as (select id, submitted_at from imports where show_id = ${show} and state in ('queued', 'running') and paused_at is null)
      select f.id, i.id as import_id, f.name, f.plan ->> 'asset' as asset, f.byte_size, f.faces, f.is_alone,
        (f.state <> 'queued' or f.lease_by is not null or f.try_after > now()) is true as is_out
      from active i cross join lateral (
        select * from import_files w where w.import_id = i.id and w.state in ('queued', 'reading', 'measuring') and w.queued_at is not null order by w.ordinal limit ${window}) f
      where (select count(*) from active) = 1 or not exists (
          select 1 from import_files e join active j on j.id = e.import_id
          where e.plan ->> 'asset' = f.plan ->> 'asset' and e.state in ('queued', 'reading', 'measuring') and e.queued_at is not null
            and (j.submitted_at, j.id) < (i.submitted_at, i.id))
      order by f.ordinal, i.submitted_at, i.id`);
    const candidates = rows.map((row) => candidateOf(row, seat));
    // Where everything in sight is in somebody's hand, what is behind it may be free.
    if (rows.length < window || candidates.some((file) => !file.isOut)) return candidates;
  }
}

function candidateOf(row: FileRow, { memory: { budget }, isRoomiest }: Seat): Candidate {
  const size = { name: row.name, byteSize: Number(row.byte_size), faces: row.faces };
  const expected = expectedMeasureBytes(size);
  const memory = row.is_alone || (expected > budget && isRoomiest) ? budget : expected > budget ? Infinity : expected;
  return { id: row.id, importId: row.import_id, asset: row.asset, byteSize: size.byteSize, faces: mostFaces(size), memory, isOut: row.is_out };
}

async function take(tx: Transaction, picked: readonly Candidate[], holder: string, worker: string): Promise<void> {
  const ids = sql.join(picked.map((file) => sql`${file.id}::uuid`), sql`, `);
  await tx.execute(sql`
    update import_files set lease_by = ${holder}, lease_until = now() + make_interval(secs => ${LEASE_S}), worker = ${worker}
    where id in (${ids}) and state = 'queued' and lease_by is null`);
  const importIds = [...new Set(picked.map((file) => file.importId))];
  for (const importId of importIds) {
    await tx.execute(sql`update imports set state = 'running' where id = ${importId} and state = 'queued'`);
    await notifyImport(tx, importId);
  }
}

async function writeTurn(tx: Transaction, show: string, lane: Lane, { began, ended }: Turn): Promise<void> {
  await tx.execute(sql`
    insert into queue_turns (show_id, lane, began, ended) values (${show}, ${lane}, ${began}, ${ended})
    on conflict (show_id, lane) do update set began = excluded.began, ended = excluded.ended`);
}
