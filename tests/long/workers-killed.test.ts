import { setTimeout as wait } from 'node:timers/promises';
import { afterEach, expect, test } from 'vitest';
import { database } from '@/db/client';
import { approveValues } from '@/lib/approvals/approve-values';
import { submitImport } from '@/lib/imports/submit-import';
import { sendJobs } from '@/lib/jobs/send-jobs';
import { lockShots } from '@/lib/locks/lock-shots';
import { setTold } from '@/lib/notices/set-told';
import { setValues } from '@/lib/settings/set-values';
import { putShots } from '@/lib/shots/put-shots';
import { boxesObj, brokenObj, gridBoxObj } from '../support/cages';
import { createCast, type Cast } from '../support/cast';
import { asOwner } from '../support/database';
import { importFiles, openWith, type SentFile } from '../support/imports';
import { killWorkers, startWorkerProcess, type WorkerProcess } from '../support/worker-process';

afterEach(killWorkers);

const BOXES = 90;
const CRATES = 8;
const KILLS = 7;

interface Row extends Record<string, unknown> {
  asset: string;
  part: string;
  revision: number;
  value_sha256: string;
}

/** A show whose ox is approved and locked in a shot, so that a heavier one is news for people. */
async function showWithLockedOx(): Promise<Cast> {
  const cast = await createCast({ linearUnit: 'm', scheme: 'polyhedral' });
  const show = cast.show.code;
  await importFiles(cast.contextOf('td'), show, { 'ox_v001.obj': boxesObj({ body: [2, 3, 4] }) }, { scheme: 'polyhedral' });
  const rows = () => asOwner<Row>('select asset, part, revision, value_sha256 from part_current where show_id = $1', [cast.show.id]);
  await setValues(cast.contextOf('td'), { show, items: (await rows()).map(({ asset, part, revision }) => ({ asset, part, revision, density_kg_m3: 10 })) });
  await approveValues(cast.contextOf('lead'), { show, items: (await rows()).map(({ asset, part, value_sha256 }) => ({ asset, part, value_sha256 })), note: '', carry_over: false });
  await putShots(cast.contextOf('lead'), { show, items: [{ code: 'fer_0010', sequence: 'fer', assets: ['ox'] }] });
  await lockShots(cast.contextOf('lead'), { show, shots: ['fer_0010'] });
  return cast;
}

/** Boxes of many sizes, versions of one asset that have no numbers, a heavier ox, and a bad file. */
function filesOfTheShow(): Record<string, SentFile> {
  const files: Record<string, SentFile> = {};
  for (let n = 0; n < BOXES; n++) files[`boxes/box${n}_v001.obj`] = { text: gridBoxObj(10, 2 + n / 7) };
  for (let n = 0; n < CRATES; n++) files[`crates/crate${String.fromCharCode(97 + n)}.obj`] = { text: gridBoxObj(8, 1 + n), asset: 'crate' };
  files['ox_v002.obj'] = { text: boxesObj({ body: [2, 3, 4.5] }) };
  files['bad_v001.obj'] = { text: brokenObj };
  return files;
}

/** The same order of victims in every run: a linear congruential generator (constants of Numerical Recipes, from memory). */
function* picks(): Generator<number, never> {
  for (let state = 20_261_201; ; ) yield (state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0);
}

const ended = async (id: string) => (await asOwner<{ ended: number }>('select count(*)::int as ended from import_files where import_id = $1 and ended_at is not null', [id]))[0].ended;

test('three workers killed at random, with every job delivered again and again: every file ends once, nothing is lost and nothing is there twice', { timeout: 1_200_000 }, async () => {
  const cast = await showWithLockedOx();
  await setTold(cast.contextOf('artist'), { show: cast.show.code, told: true, asset: undefined, shot: undefined });
  const files = filesOfTheShow();
  const total = Object.keys(files).length;
  const id = await openWith(cast.contextOf('td'), cast.show.code, files, { scheme: 'catmull-clark' });
  await submitImport(cast.contextOf('td'), { show: cast.show.code, import: id });
  const workers: WorkerProcess[] = [startWorkerProcess(), startWorkerProcess(), startWorkerProcess()];
  const pick = picks();
  let killed = 0;
  let duplicates = 0;
  for (let turns = 0; ; turns++) {
    const done = await ended(id);
    if (done === total) break;
    if (turns > 8_000) throw new Error(`${done} of ${total} files ended.\n${workers.map((worker) => worker.output()).join('\n')}`);
    if (killed < KILLS && done >= ((killed + 1) * total) / (KILLS + 2)) {
      const victim = pick.next().value % workers.length;
      await workers[victim].end('SIGKILL');
      workers[victim] = startWorkerProcess();
      killed++;
    }
    // Jobs come twice and more often than there is work, and jobs that were done come again.
    if (turns % 5 === 0) {
      await sendJobs(database(), 'import-files', [{ importId: id }, { importId: id }]);
      await asOwner(`update pgboss.job set state = 'created', started_on = null, completed_on = null where id = (select id from pgboss.job where name = 'import-files' and state = 'completed' order by random() limit 1)`);
      duplicates += 3;
    }
    await wait(100);
  }
  for (let n = 0; n < 3; n++) await sendJobs(database(), 'tell-import', [{ importId: id, since: null }]);
  const left = async () => (await asOwner<{ left: number }>(`select count(*)::int as left from pgboss.job where name in ('import-files', 'tell-import') and state in ('created', 'retry', 'active') and data ->> 'importId' = $1 and start_after <= now()`, [id]))[0].left;
  for (let turns = 0; turns < 600 && (await left()) > 0; turns++) await wait(100);
  await Promise.all(workers.map((worker) => worker.end('SIGTERM')));
  expect(killed).toBe(KILLS);
  expect(duplicates).toBeGreaterThan(KILLS);
  await expectNothingTwice(cast, id, total);
});

async function expectNothingTwice(cast: Cast, id: string, total: number): Promise<void> {
  expect(await asOwner('select state from imports where id = $1', [id])).toEqual([{ state: 'done' }]);
  const states = await asOwner('select state, error_code, count(*)::int as files from import_files where import_id = $1 group by 1, 2 order by 1', [id]);
  expect(states).toEqual([{ state: 'done', error_code: null, files: total - 1 }, { state: 'failed', error_code: expect.stringMatching(/^(?!gave_up)/) as string, files: 1 }]);
  // One version a good file, each recorded once in the history, and one measurement for each content.
  const versions = await asOwner<{ code: string; label: string; name: string }>(
    `select a.code, v.label, f.name from asset_versions v join assets a on a.id = v.asset_id join import_files f on f.id = v.import_file_id where f.import_id = $1`, [id]);
  expect(versions).toHaveLength(total - 1);
  expect(new Set(versions.map((version) => version.name)).size).toBe(total - 1);
  expect(new Set(versions.map((version) => `${version.code} ${version.label}`)).size).toBe(total - 1);
  const acts = await asOwner<{ subject: string; after: string }>(
    `select e.subject, i.after from audit_events e join audit_items i on i.event_id = e.id where e.show_id = $1 and e.act = 'import-version' and i.field = 'version' and not (e.subject = 'ox' and i.after = 'v001')`, [cast.show.id]);
  expect(acts.map((act) => `${act.subject} ${act.after}`).toSorted()).toEqual(versions.map((version) => `${version.code} ${version.label}`).toSorted());
  const records = await asOwner(`select r.content_sha256 from geometry_records r where r.content_sha256 in (select sha256 from import_files where import_id = $1) group by 1 having count(*) > 1`, [id]);
  expect(records).toEqual([]);
  // Files without numbers got theirs in the order of their names, whoever measured them and whoever was killed.
  const crates = versions.filter((version) => version.code === 'crate').toSorted((a, b) => (a.name < b.name ? -1 : 1));
  expect(crates.map((version) => version.label)).toEqual(Array.from({ length: CRATES }, (_, n) => `v00${n + 1}`));
  // The import was told of once to each, though the telling was ordered four times; and its one end is in the history of no worker twice.
  const notices = await asOwner<{ user_id: string; key: string }>('select user_id, key from notices where show_id = $1 and key like $2', [cast.show.id, `import:${id}%`]);
  expect(notices.map((notice) => notice.user_id).toSorted()).toEqual([cast.people.artist.id, cast.people.lead.id].toSorted());
  const rows = await asOwner('select asset, part from part_current where show_id = $1', [cast.show.id]);
  expect(rows).toHaveLength(BOXES + 2);
  expect(await asOwner('select id from import_files where import_id = $1 and (lease_by is not null or lease_until is not null)', [id])).toEqual([]);
}
