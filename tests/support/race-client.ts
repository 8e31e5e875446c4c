import { database, closeDatabase } from '@/db/client';
import { POST as approve } from '@/app/api/v1/shows/[show]/approvals/route';
import { PATCH as set } from '@/app/api/v1/shows/[show]/parts/route';
import { POST as lock } from '@/app/api/v1/shows/[show]/shots/[shot]/locks/route';
import { POST as unlock } from '@/app/api/v1/shows/[show]/shots/[shot]/unlocks/route';
import { POST as withdraw } from '@/app/api/v1/shows/[show]/withdrawals/route';

/** What one process of the race does, as JSON in its first argument. */
export interface RacePlan {
  show: string;
  seed: number;
  clients: number;
  acts: number;
  parts: string[];
  shots: string[];
  setter: string;
  lead: string;
}

/** An act of a client with its answer, and the newest events of the history before it was sent and after it was answered. */
export interface RaceAct {
  act: 'set' | 'approve' | 'withdraw' | 'lock' | 'unlock';
  part: string;
  shot: string | null;
  /** What the act was made against: a value's hash, an approval or a lock. */
  against: string;
  status: number;
  code: string | null;
  from: number;
  to: number;
}

type Handler = (request: Request, context: { params: Promise<Record<string, string | string[]>> }) => Promise<Response>;

const plan = JSON.parse(process.argv[2]) as RacePlan;

/** A generator with a seed of its own (mulberry32), so that a run that fails can be looked at again. */
function randomOf(seed: number): (below: number) => number {
  let state = seed;
  return (below) => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) % below;
  };
}

async function send(handler: Handler, token: string, method: string, params: Record<string, string>, body: object): Promise<{ status: number; code: string | null }> {
  const request = new Request('http://127.0.0.1:3000/api/v1/race', { method, headers: { authorization: `Bearer ${token}`, 'content-type': 'application/json', host: '127.0.0.1:3000' }, body: JSON.stringify(body) });
  const response = await handler(request, { params: Promise.resolve(params) });
  const answer = (await response.json()) as { code?: string; errors?: { code: string }[] };
  return { status: response.status, code: answer.errors?.[0]?.code ?? answer.code ?? null };
}

async function newestEvent(): Promise<number> {
  const { rows } = await database().execute<{ id: string | null }>('select max(id) as id from audit_events');
  return Number(rows[0].id ?? 0);
}

async function look<Row extends object>(text: string): Promise<Row[]> {
  return (await database().execute(text)).rows as unknown as Row[];
}

async function oneAct(random: (below: number) => number): Promise<RaceAct | null> {
  const part = plan.parts[random(plan.parts.length)];
  const shot = plan.shots[random(plan.shots.length)];
  const from = await newestEvent();
  const [row] = await look<{ revision: number; value_sha256: string; part_id: string }>(`select revision, value_sha256, part_id from part_current where part = '${part}'`);
  const approvals = await look<{ id: string }>(`select id from approvals where part_id = '${row.part_id}' order by ordinal desc limit 6`);
  const locks = await look<{ id: string; code: string }>(`select l.id, s.code from locks l join shots s on s.id = l.shot_id where l.part_id = '${row.part_id}' order by l.locked_at desc limit 3`);
  const params = { show: plan.show };
  const item = { asset: 'crate', part };
  const done = async (act: RaceAct['act'], against: string, inShot: string | null, answer: { status: number; code: string | null }): Promise<RaceAct> => ({ act, part, shot: inShot, against, ...answer, from, to: await newestEvent() });
  const choice = random(12);
  if (choice < 2) return done('set', row.value_sha256, null, await send(set, plan.setter, 'PATCH', params, { items: [{ ...item, revision: row.revision, density_kg_m3: 1 + random(3) }] }));
  if (choice < 5) return done('approve', row.value_sha256, null, await send(approve, plan.lead, 'POST', params, { items: [{ ...item, value_sha256: row.value_sha256 }] }));
  const approval = approvals.length > 0 ? approvals[random(approvals.length)].id : null;
  if (choice < 8) return approval === null ? null : done('withdraw', approval, null, await send(withdraw, plan.lead, 'POST', params, { items: [{ value_id: approval }], reason: 'race' }));
  if (choice < 10) return approval === null ? null : done('lock', approval, shot, await send(lock, plan.lead, 'POST', { ...params, shot }, { items: [{ ...item, value_id: approval }] }));
  const held = locks.length > 0 ? locks[random(locks.length)] : null;
  return held === null ? null : done('unlock', held.id, held.code, await send(unlock, plan.lead, 'POST', { ...params, shot: held.code }, { items: [{ lock: held.id }], reason: 'race' }));
}

async function client(index: number): Promise<void> {
  const random = randomOf(plan.seed * 1000 + index);
  for (let i = 0; i < plan.acts; i++) {
    const act = await oneAct(random);
    if (act) process.stdout.write(`${JSON.stringify(act)}\n`);
  }
}

await Promise.all(Array.from({ length: plan.clients }, (_, index) => client(index)));
await closeDatabase();
