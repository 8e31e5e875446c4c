import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { cpus, loadavg, tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { setTimeout as wait } from 'node:timers/promises';
import { Client } from 'pg';
import { largeCage } from '@/db/seed/cages/large-cage';
import { gridBoxObj } from '../support/cages';
import { makeDatabase, removeOwnCluster, startOwnCluster } from '../support/own-cluster';
import { writeTorusObj } from '../support/write-torus-obj';
import type { BenchFile } from './intake-files';
import { bundleWorker, forgetPeak, peakBytes, startBenchWorker } from './intake-worker';

/** One import from submit to the last row, by worker processes as production runs them, on a server that keeps what it says it kept. */
interface IntakeRow {
  what: string;
  files: number;
  faces: number;
  megabytes: number;
  workers: number;
  threadsEach: number;
  /** From before the first file to after the last one was sent and stored. */
  uploadS: number;
  submitS: number;
  /** From before the submit to the moment at which all rows were there. */
  allS: number;
  /** The same for the files that are not huge; null where none is. */
  smallS: number | null;
  filesPerS: number;
  facesPerS: number;
  /** Of this process, which does what the web server does of it. */
  webPeakMb: number;
  /** Of each worker. */
  workerPeakMb: number[];
  load: number;
}

interface IntakeCase {
  what: string;
  workers: readonly [processes: number, threads: number];
  files: (folder: string) => BenchFile[];
}

const HUGE = 'huge_v001.obj';
const FACES = 5_000;

/** No two files of a run alike, so that each is measured: `of` counts them on. */
let of = 0;
const columns = (files: number): BenchFile[] => Array.from({ length: files }, (_, n) => seeded(`props/column${n}_v001.obj`, (seed) => largeCage(FACES, seed)));
const boxes = (files: number): BenchFile[] => Array.from({ length: files }, (_, n) => seeded(`props/box${n}_v001.obj`, (seed) => gridBoxObj(4, 2 + seed / 1000)));

function seeded(name: string, make: (seed: number) => string): BenchFile {
  const seed = of++;
  return { name, text: () => make(seed) };
}

/** A torus of n × n quads, some of them cut. */
function torusFile(folder: string, n: number, cut: boolean): BenchFile {
  const path = join(folder, `torus-${n}.obj`);
  writeTorusObj(path, n, cut);
  return { name: HUGE, path };
}

function casesOf(files: number, large: boolean): IntakeCase[] {
  const cases: IntakeCase[] = [
    { what: `of ${FACES} faces`, workers: [1, 1], files: () => columns(files) },
    { what: `of ${FACES} faces`, workers: [2, 1], files: () => columns(files) },
    { what: `of ${FACES} faces`, workers: [1, 2], files: () => columns(files) },
    { what: 'small', workers: [1, 2], files: () => boxes(files) },
    { what: 'small and a huge one', workers: [1, 2], files: (folder) => [torusFile(folder, 1_000, true), ...boxes(files)] },
  ];
  if (!large) return cases;
  return [
    ...cases,
    { what: 'an asset of 2 M faces', workers: [1, 2], files: (folder) => [torusFile(folder, 1_410, true)] },
    { what: 'an OBJ of 1 GB', workers: [1, 2], files: (folder) => [torusFile(folder, 3_300, false)] },
  ];
}

async function measureCase({ what, workers: [processes, threads], files: make }: IntakeCase, bundle: string, folder: string, look: Client): Promise<IntakeRow> {
  const { createUser, createShowRow, contextOf } = await import('../support/cast');
  const { openImport } = await import('@/lib/imports/open-import');
  const { submitImport } = await import('@/lib/imports/submit-import');
  const { sendFiles } = await import('./intake-files');
  const context = contextOf(await createUser({ isAdmin: true }));
  const { id: showId, code: show } = await createShowRow();
  const { id } = await openImport(context, { show });
  const files = make(folder);
  const load = loadavg()[0];
  const workers = await Promise.all(Array.from({ length: processes }, () => startBenchWorker(bundle, threads)));
  try {
    forgetPeak();
    const begin = performance.now();
    await sendFiles(context, show, id, files);
    const sent = performance.now();
    await submitImport(context, { show, import: id });
    const submitted = performance.now();
    let smallAt: number | null = null;
    for (;;) {
      const { rows: [now] } = await look.query<{ state: string; small: number }>('select i.state, (select count(*)::int from import_files f where f.import_id = i.id and f.ended_at is null and f.name <> $2) as small from imports i where i.id = $1', [id, HUGE]);
      if (now.small === 0) smallAt ??= performance.now();
      if (now.state === 'done') break;
      await wait(100);
    }
    const allS = (performance.now() - sent) / 1000;
    const { rows: [count] } = await look.query<{ done: number; values: number; faces: number; bytes: string }>(
      `select count(*) filter (where f.state = 'done')::int as done, (select count(*)::int from part_current p where p.show_id = $2) as values, sum(r.faces)::int as faces, sum(f.byte_size) as bytes
        from import_files f left join asset_versions v on v.id = f.version_id left join geometry_records r on r.id = v.record_id where f.import_id = $1`, [id, showId]);
    if (count.done !== files.length || count.values !== files.length) throw new Error(`${count.done} of ${files.length} files were measured, ${count.values} rows are there.`);
    return {
      what, files: files.length, faces: count.faces, megabytes: Number(count.bytes) / 1e6, workers: processes, threadsEach: threads, uploadS: (sent - begin) / 1000, submitS: (submitted - sent) / 1000, allS,
      smallS: files.length > 1 && files.some((file) => file.name === HUGE) && smallAt !== null ? (smallAt - sent) / 1000 : null, filesPerS: files.length / allS, facesPerS: count.faces / allS,
      webPeakMb: peakBytes('self') / 2 ** 20, workerPeakMb: workers.map((worker) => worker.peakBytes() / 2 ** 20), load: Math.max(load, loadavg()[0]),
    };
  } finally {
    await Promise.all(workers.map((worker) => worker.stop()));
  }
}

/** Files of about 5,000 faces, small ones, and huge ones among and beside them; with `large` also a gigabyte. Prints a table, and writes it to bench-results/intake.json. */
export async function printIntake({ files, large, only }: { files: number; large: boolean; only: string | null }): Promise<void> {
  mkdirSync('bench-results', { recursive: true });
  const bundle = mkdtempSync(resolve('bench-results', 'worker-'));
  const folder = mkdtempSync(join(tmpdir(), 'weighhouse-intake-'));
  const cluster = join(folder, 'cluster');
  const rows: IntakeRow[] = [];
  try {
    await bundleWorker(bundle);
    const servers = await startOwnCluster(cluster);
    const { ownerUrl, appUrl } = await makeDatabase(servers, 'intake');
    const superuser = new Client({ connectionString: servers.superuserUrl });
    await superuser.connect();
    // A throw-away server does not wait for its disk; the product's does.
    for (const setting of ['fsync', 'synchronous_commit', 'full_page_writes']) await superuser.query(`alter system set ${setting} = on`);
    await superuser.query('select pg_reload_conf()');
    await superuser.end();
    Object.assign(process.env, { DATABASE_URL: ownerUrl, WEIGHHOUSE_APP_DATABASE_URL: appUrl, WEIGHHOUSE_DATA: join(folder, 'data'), LOG_LEVEL: 'warn' });
    const { closeDatabase } = await import('@/db/client');
    const look = new Client({ connectionString: ownerUrl });
    await look.connect();
    try {
      for (const one of casesOf(files, large).filter(({ what }) => only === null || what.includes(only))) {
        const row = await measureCase(one, bundle, folder, look);
        rows.push(row);
        console.log(`${row.files} ${row.what}, ${row.workers} × ${row.threadsEach}: ${row.allS.toFixed(1)} s`);
      }
    } finally {
      await look.end();
      await closeDatabase();
    }
  } finally {
    await removeOwnCluster(cluster);
    for (const one of [folder, bundle]) rmSync(one, { recursive: true, force: true });
  }
  console.table(rows.map((row) => ({
    files: row.files, what: row.what, 'faces': row.faces, MB: Math.round(row.megabytes), workers: row.workers, 'threads each': row.threadsEach, 'upload s': rounded(row.uploadS), 'submit s': rounded(row.submitS), 'submit to all rows s': rounded(row.allS),
    'small ones s': row.smallS === null ? '' : rounded(row.smallS), 'files/s': rounded(row.filesPerS), 'faces/s': Math.round(row.facesPerS), 'peak MB web': Math.round(row.webPeakMb), 'peak MB workers': row.workerPeakMb.map(Math.round).join(', '), load: rounded(row.load),
  })));
  console.log(`node ${process.version}, ${cpus()[0].model}, ${cpus().length} cores`);
  writeFileSync('bench-results/intake.json', `${JSON.stringify({ node: process.version, processor: cpus()[0].model, cores: cpus().length, rows }, null, 1)}\n`);
}

const rounded = (value: number): number => Number(value.toPrecision(3));
