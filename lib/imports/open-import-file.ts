import { eq, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { MeshError } from '@/lib/formats/mesh-error';
import { isSideFile, meshOfSideFile } from '@/lib/rules/side-files';
import { endFile, lockHeldFile } from './end-file';
import type { ImportFile } from './lease';
import type { FileWork } from './measure-import-file';
import { mayUnpack, takeEntryAgain, unpackArchive } from './unpack-archive';

/**
 * What a held file is, before it is measured: an archive of several meshes becomes files of its own, a file that is read with a mesh beside it ends with that said,
 * and an entry of an archive that could not be unpacked is tried once more. Answers the file to measure; null where it has ended.
 * Errors: MeshError where it cannot be opened; what storage and database throw.
 */
export async function openImportFile(work: FileWork, file: ImportFile): Promise<ImportFile | null> {
  const taken = await withOwnBytes(work, file);
  if (isSideFile(taken.name)) {
    await work.db.transaction((tx) => endSideFile(tx, work.holder, taken));
    return null;
  }
  return mayUnpack(taken) && (await unpackArchive(work, taken)) ? null : taken;
}

/** An entry that failed to be unpacked stands under its archive's bytes until it has its own. */
async function withOwnBytes(work: FileWork, file: ImportFile): Promise<ImportFile> {
  if (file.archiveId === null || file.archiveEntry === null) return file;
  const [archive] = await work.db.select().from(importFiles).where(eq(importFiles.id, file.archiveId));
  if (archive.sha256 !== file.sha256) return file;
  const { sha256, byteSize } = await takeEntryAgain(work, archive, file.archiveEntry);
  return work.db.transaction(async (tx) => {
    const held = await lockHeldFile(tx, file.id, work.holder);
    if (held) await tx.update(importFiles).set({ sha256, byteSize }).where(eq(importFiles.id, file.id));
    return { ...file, sha256, byteSize };
  });
}

async function endSideFile(tx: Transaction, holder: string, file: ImportFile): Promise<void> {
  const held = await lockHeldFile(tx, file.id, holder);
  if (!held) return;
  const { pattern, inWords } = meshOfSideFile(file.name);
  const names = await tx.select({ name: importFiles.name }).from(importFiles).where(sql`${importFiles.importId} = ${file.importId} and ${importFiles.name} ~* '\\.(obj|gltf)$'`);
  if (!names.some(({ name }) => pattern.test(name))) throw new MeshError({ code: 'no_mesh_beside', expected: inWords, detail: `expected the mesh that it is read with, ${inWords}, in the same import, found none` });
  await endFile(tx, held, { state: 'done', unpackedInto: null, remark: 'read_beside' });
}
