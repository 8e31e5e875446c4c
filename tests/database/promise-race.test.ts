import { spawn } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { expect, test } from 'vitest';
import { setValues } from '@/lib/settings/set-values';
import { createCrateShow } from '../support/crate-show';
import { asOwner } from '../support/database';
import type { RaceAct, RacePlan } from '../support/race-client';

const root = fileURLToPath(new URL('../../', import.meta.url));
const PROCESSES = 3;
const CLIENTS = 17;
const ACTS = 8;

/** Runs one process of clients; answers what they did. */
function race(plan: RacePlan): Promise<RaceAct[]> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, ['--import', 'tsx', 'tests/support/race-client.ts', JSON.stringify(plan)], { cwd: root, env: process.env, stdio: ['ignore', 'pipe', 'pipe'] });
    let out = '';
    let faults = '';
    child.stdout.on('data', (chunk: Buffer) => (out += chunk.toString()));
    child.stderr.on('data', (chunk: Buffer) => (faults += chunk.toString()));
    child.on('exit', (code) => {
      if (code !== 0) return reject(new Error(`the clients ended with ${code}: ${faults}`));
      resolve(out.trim().split('\n').map((line) => JSON.parse(line) as RaceAct));
    });
  });
}

interface Change extends Record<string, unknown> {
  id: number;
  act: string;
  part: string;
  field: string;
  before: string | null;
  after: string | null;
  /** Of a lock-values: the lock that the act made. */
  lock: string | null;
}

/** The rules one act at a time, fed with the history in its order: what holds after each event. */
class SerialModel {
  readonly standing = new Set<string>();
  readonly withdrawn = new Set<string>();
  /** Each live lock with its approval, by `shot part`. */
  readonly locked = new Map<string, { lock: string; approval: string }>();
  readonly broken: string[] = [];

  /** Applies a change of the history; what the rules do not allow there is noted. */
  apply({ id, act, part, field, before, after, lock }: Change): void {
    const refuse = (why: string): void => void this.broken.push(`event ${id}: ${act} of ${part}: ${why}`);
    if (act === 'approve-values') this.standing.add(after!);
    if (act === 'withdraw-approvals') {
      if (!this.standing.delete(before!)) refuse('was not approved');
      if (this.isLocked(before!)) refuse('a live lock uses it');
      this.withdrawn.add(before!);
    }
    const place = `${field.replace('lock ', '')} ${part}`;
    if (act === 'lock-values') {
      if (!this.standing.has(after!)) refuse('is not approved');
      if (this.locked.has(place)) refuse('is locked already');
      this.locked.set(place, { lock: lock!, approval: after! });
    }
    if (act === 'unlock-values') {
      if (this.locked.get(place)?.approval !== before) refuse('was not locked to this');
      this.locked.delete(place);
    }
  }

  /** Whether the rules would refuse the act for this reason as things stand. */
  refuses({ act, part, shot, against, code }: RaceAct): boolean {
    if (act === 'withdraw') return code === 'locked' ? this.isLocked(against) : code === 'already_withdrawn' && this.withdrawn.has(against);
    if (act === 'lock') {
      const held = this.locked.get(`${shot} ${part}`);
      return code === 'already_locked' ? held !== undefined && held.approval !== against : code === 'not_approved' && this.withdrawn.has(against);
    }
    return act === 'unlock' && code === 'already_unlocked' && this.locked.get(`${shot} ${part}`)?.lock !== against;
  }

  private isLocked(approval: string): boolean {
    return [...this.locked.values()].some((one) => one.approval === approval);
  }
}

test('three processes with 51 clients approve, take back, lock and unlock the same rows as one after the other would', { timeout: 300_000 }, async () => {
  const cast = await createCrateShow();
  await setValues(cast.contextOf('td'), { show: cast.show.code, items: [{ asset: 'crate', part: 'lid', revision: 1, density_kg_m3: 1 }] });
  const plan = { show: cast.show.code, clients: CLIENTS, acts: ACTS, parts: ['body', 'lid'], shots: ['fer_0010', 'fer_0020'], setter: cast.people.td.token, lead: cast.people.lead.token };
  const acts = (await Promise.all(Array.from({ length: PROCESSES }, (_, seed) => race({ ...plan, seed })))).flat();
  expect(acts.length).toBeGreaterThan((PROCESSES * CLIENTS * ACTS) / 2);
  expect(acts.filter((one) => one.status >= 500)).toEqual([]);
  for (const act of ['set', 'approve', 'withdraw', 'lock', 'unlock'] as const) expect(acts.filter((one) => one.act === act && one.status < 300).length, act).toBeGreaterThan(0);

  const changes = await asOwner<Change>(
    `select e.id::int, e.act, p.name as part, i.field, i.before, i.after,
       (select l.id from locks l join shots s on s.id = l.shot_id where l.part_id = i.part_id and i.field = 'lock ' || s.code and l.locked_at = e.at and e.act = 'lock-values') as lock
     from audit_events e join audit_items i on i.event_id = e.id join parts p on p.id = i.part_id
     where e.show_id = $1 and e.act in ('approve-values', 'withdraw-approvals', 'lock-values', 'unlock-values') order by e.id, i.id`,
    [cast.show.id],
  );
  const model = new SerialModel();
  const lockRows = await asOwner<{ id: string; approval_id: string; live: boolean; place: string; hash: string }>(
    `select l.id, l.approval_id, l.unlocked_at is null as live, s.code || ' ' || p.name as place, l.value_sha256 as hash
     from locks l join shots s on s.id = l.shot_id join parts p on p.id = l.part_id where l.show_id = $1`,
    [cast.show.id],
  );
  // A refusal is right if the rules refuse it for that reason in some state that stood between sending and answer.
  const waiting = acts.filter((one) => one.status >= 300 && !['changed_meanwhile', 'conflict'].includes(one.code ?? ''));
  const unexplained = new Set(waiting);
  const explain = (from: number, below: number): void => {
    for (const one of unexplained) if (one.from < below && one.to >= from && model.refuses(one)) unexplained.delete(one);
  };
  let last = 0;
  for (const change of changes) {
    explain(last, change.id);
    model.apply(change);
    last = change.id;
  }
  explain(last, Infinity);
  expect(model.broken).toEqual([]);
  expect([...unexplained]).toEqual([]);

  // What the tables hold at the end is what the rules hold.
  expect(Object.fromEntries(lockRows.filter((row) => row.live).map((row) => [row.place, row.approval_id]))).toEqual(Object.fromEntries([...model.locked].map(([place, { approval }]) => [place, approval])));
  const standing = await asOwner<{ id: string }>('select id from approvals a where show_id = $1 and not exists (select 1 from withdrawals w where w.approval_id = a.id)', [cast.show.id]);
  expect(new Set(standing.map((row) => row.id))).toEqual(model.standing);
  const rows = await asOwner<{ state: string; wanted: string }>(
    `select c.state, case when exists (select 1 from approvals a where a.part_id = c.part_id and a.value_sha256 = c.value_sha256 and not exists (select 1 from withdrawals w where w.approval_id = a.id)) then 'approved'
       when exists (select 1 from approvals a where a.part_id = c.part_id and not exists (select 1 from withdrawals w where w.approval_id = a.id)) then 'outdated' else 'measured' end as wanted
     from part_current c where c.show_id = $1`,
    [cast.show.id],
  );
  for (const row of rows) expect(row.state).toBe(row.wanted);
});
