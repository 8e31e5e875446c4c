import { and, eq, inArray, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { shows } from '@/db/schema/shows';
import { MeshError } from '@/lib/formats/mesh-error';
import type { StoredPlan } from '@/lib/rules/import-plan';
import { splitPath } from '@/lib/rules/name-pattern';
import { countAgainst } from '@/lib/storage/count-against';
import { endFile, lockHeldFile } from './end-file';
import { planOfImport } from './import-plan-of';
import type { ImportFile } from './lease';
import type { FileWork } from './measure-import-file';
import { queueFiles } from './queue-files';
import type { TakenEntry } from './unpack-archive';

/** Rows of one insert: PostgreSQL takes at most 65,535 parameters in a statement. */
const CHUNK = 1_000;
const MOST_NAME = 1_024;
/** Of a file that makes no version. */
const NO_PLACE: StoredPlan = { asset: null, category: 'other', version: null, qualified: false, duplicate: false, readName: null, place: '' };

/**
 * Writes unpacked entries down as files of the archive's import, lets them wait for their turn, and ends the archive, all of it or nothing: where the archive is not
 * held any more nothing happens. Errors: MeshError duplicate, name_too_long; StudioError too_large.
 */
export async function writeEntries(tx: Transaction, { holder, importRow }: FileWork, archive: ImportFile, taken: readonly TakenEntry[]): Promise<void> {
  const held = await lockHeldFile(tx, archive.id, holder);
  if (!held) return;
  const names = await namesOf(tx, held, taken.map((one) => one.entry));
  await countEntries(tx, importRow.showId, held.importId, taken);
  const rows = taken.map((one, index) => rowOf(held, one, names[index]));
  const queued = new Set<string>();
  for (let start = 0; start < rows.length; start += CHUNK) {
    const written = await tx.insert(importFiles).values(rows.slice(start, start + CHUNK)).returning({ id: importFiles.id, state: importFiles.state });
    for (const { id, state } of written) if (state === 'queued') queued.add(id);
  }
  const [show] = await tx.select({ namePattern: shows.namePattern }).from(shows).where(eq(shows.id, importRow.showId));
  await queueFiles(tx, held.importId, await planOfImport(tx, held.importId, show.namePattern), queued);
  await endFile(tx, held, { state: 'done', unpackedInto: taken.filter((one) => one.kind === 'mesh').length, remark: 'unpacked' });
}

/** Names under the archive's own, without its extension unless files of that folder were dropped too. */
async function namesOf(tx: Transaction, archive: ImportFile, entries: readonly string[]): Promise<string[]> {
  for (const folder of [archive.name.replace(/\.zip$/i, ''), archive.name]) {
    const names = entries.map((entry) => nameIn(folder, entry));
    const long = names.find((name) => name.length > MOST_NAME);
    if (long !== undefined) throw new MeshError({ code: 'name_too_long', found: long.slice(0, 200), detail: `expected names of at most ${MOST_NAME} characters with the archive's own before them, found ${long.length}` });
    const seen = new Set<string>();
    const twice = names.find((name) => seen.size === seen.add(name).size);
    if (twice !== undefined) throw new MeshError({ code: 'duplicate', found: twice.slice(0, 200), detail: `expected each name once, found ${twice.slice(0, 200)} twice` });
    if (!(await areTaken(tx, archive.importId, names))) return names;
  }
  throw new MeshError({ code: 'duplicate', detail: `expected the folder ${archive.name.slice(0, 200)} to be free, found files of this import there` });
}

function nameIn(folder: string, entry: string): string {
  const { folders, file } = splitPath(`${folder}/${entry.normalize('NFC')}`);
  return [...folders, file].join('/');
}

async function areTaken(tx: Transaction, importId: string, names: readonly string[]): Promise<boolean> {
  for (let start = 0; start < names.length; start += CHUNK) {
    const [found] = await tx
      .select({ id: importFiles.id })
      .from(importFiles)
      .where(and(eq(importFiles.importId, importId), inArray(importFiles.name, names.slice(start, start + CHUNK))))
      .limit(1);
    if (found) return true;
  }
  return false;
}

/** What is unpacked counts for show and import like what is dropped. */
async function countEntries(tx: Transaction, showId: string, importId: string, taken: readonly TakenEntry[]): Promise<void> {
  const sizes = new Map(taken.flatMap(({ blob }) => (blob ? [[blob.sha256, blob.byteSize] as const] : [])));
  const hashes = [...sizes.keys()];
  const { rows } = await tx.execute<{ sha256: string }>(sql`
    select distinct f.sha256 from import_files f join imports i on i.id = f.import_id where i.show_id = ${showId} and f.sha256 = any(${sql.param(hashes)}::text[])`);
  const known = new Set(rows.map((row) => row.sha256));
  const fresh = hashes.filter((hash) => !known.has(hash)).reduce((sum, hash) => sum + sizes.get(hash)!, 0);
  await countAgainst(tx, { kind: 'show', showId }, fresh);
  await countAgainst(tx, { kind: 'import', importId }, taken.reduce((sum, one) => sum + (one.blob?.byteSize ?? one.byteSize), 0));
  await countAgainst(tx, { kind: 'files', importId }, taken.length);
}

/** A file of the import that waits; or has ended: failed, or read with a mesh beside it. */
function rowOf(archive: ImportFile, { entry, kind, blob, byteSize, error }: TakenEntry, name: string): typeof importFiles.$inferInsert {
  const row = { importId: archive.importId, name, sha256: blob?.sha256 ?? archive.sha256, byteSize: blob?.byteSize ?? byteSize, categoryOverride: archive.categoryOverride, archiveId: archive.id, archiveEntry: entry };
  if (error) return { ...row, plan: NO_PLACE, state: 'failed', errorCode: error.code, errorMessage: `${error.detail.charAt(0).toUpperCase()}${error.detail.slice(1)}.`, endedAt: new Date() };
  return kind === 'mesh' ? row : { ...row, plan: NO_PLACE, state: 'done', remark: 'read_beside', endedAt: new Date() };
}
