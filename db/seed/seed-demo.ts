import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { and, eq, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { auditEvents } from '@/db/schema/audit-events';
import { imports } from '@/db/schema/imports';
import { shows } from '@/db/schema/shows';
import { createShow } from '@/lib/shows/create-show';
import { setMember } from '@/lib/shows/set-member';
import { demoFiles, type DemoFile } from './cages/demo-files';
import { contextOf, CREW, seedCrew } from './demo-crew';
import { seedMasses } from './demo-masses';
import { seedShots } from './demo-shots';
import { importDemoFiles } from './import-demo-files';
import { seedMaterials } from './seed-materials';

export const DEMO_SHOW = 'tarn';
/** Kept out of the show: whoever tries the demo drops it. */
const TO_DROP = 'tarnOx_v013.obj';

export interface DemoReport {
  /** The heavier ox, to be dropped by hand. */
  toDrop: string;
  /** Files brought in by this call; 0 where the show was there. */
  files: number;
  failed: number;
  massesSet: number;
  /** Steps of the shots' story done by this call; 0 where all of it was there. */
  shotSteps: number;
}

/** Of each asset the newest version comes with the second import, the older ones with the first. */
function inTwoImports(files: readonly DemoFile[]): [DemoFile[], DemoFile[]] {
  const folderOf = ({ path: name }: DemoFile) => path.posix.dirname(name);
  const newest = new Set(files.filter((file, index) => !files.slice(index + 1).some((later) => folderOf(later) === folderOf(file))));
  return [files.filter((file) => !newest.has(file)), files.filter((file) => newest.has(file))];
}

async function ensureShow(db: Database): Promise<string> {
  const [there] = await db.select({ id: shows.id }).from(shows).where(eq(sql`lower(${shows.code})`, DEMO_SHOW));
  const admin = await contextOf(db, CREW.odrun);
  if (!there) {
    const frame = { linear_unit: 'cm', up_axis: 'y', scheme: 'catmull-clark', self_approval: true } as const;
    await createShow(admin, { code: DEMO_SHOW, title: 'The Bell Under Ferrow Tarn', ...frame, leads: [CREW.tamsel.email] });
  }
  for (const { email, role } of [CREW.ilvo, CREW.hesta]) await setMember(admin, { show: DEMO_SHOW, email, role });
  await setMember(admin, { show: DEMO_SHOW, email: CREW.pell.email, role: 'guest', assets: ['sledge', 'raft'] });
  const [{ id }] = await db.select({ id: shows.id }).from(shows).where(eq(sql`lower(${shows.code})`, DEMO_SHOW));
  return id;
}

/**
 * The demo: people, material library, show, cages by the real import path, masses, shots, approvals and locks by the real verbs. Running it again does
 * what is missing and nothing twice.
 */
export async function seedDemo(db: Database, dataFolder: string): Promise<DemoReport> {
  await seedCrew(db);
  await seedMaterials(db);
  const showId = await ensureShow(db);
  const files = demoFiles();
  const toDrop = path.join(dataFolder, 'demo', TO_DROP);
  await mkdir(path.dirname(toDrop), { recursive: true });
  await writeFile(toDrop, files.find((file) => file.path.endsWith(`/${TO_DROP}`))?.text ?? '');
  const seeded = files.filter((file) => !file.path.endsWith(`/${TO_DROP}`));
  const td = await contextOf(db, CREW.ilvo);
  const done = await db.$count(imports, and(eq(imports.showId, showId), eq(imports.state, 'done')));
  const report: DemoReport = { toDrop, files: 0, failed: 0, massesSet: 0, shotSteps: 0 };
  for (const batch of inTwoImports(seeded).slice(done)) {
    const { counts } = await importDemoFiles(td, DEMO_SHOW, batch);
    report.files += counts.total;
    report.failed += counts.failed;
  }
  const isSet = await db.$count(auditEvents, and(eq(auditEvents.showId, showId), eq(auditEvents.act, 'set-values')));
  if (isSet === 0) report.massesSet = await seedMasses(td, DEMO_SHOW);
  report.shotSteps = await seedShots({ td, lead: await contextOf(db, CREW.tamsel), artist: await contextOf(db, CREW.hesta) }, showId, DEMO_SHOW);
  return report;
}
