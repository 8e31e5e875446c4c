import { randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import path from 'node:path';
import { pipeline } from 'node:stream/promises';
import { eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { importFiles } from '@/db/schema/import-files';
import { config } from '@/lib/config';
import { archiveContent, type ArchiveContent } from '@/lib/formats/archive-assets';
import { MeshError } from '@/lib/formats/mesh-error';
import { extensionOf } from '@/lib/formats/mesh-extensions';
import { openArchiveFile, type Archive } from '@/lib/formats/open-archive';
import { StudioError } from '@/lib/rules/studio-error';
import { pathInFolder, UNFINISHED } from '@/lib/storage/disk';
import { openBlob } from '@/lib/storage/open-blob';
import { storeBlob, type StoredBlob } from '@/lib/storage/store-blob';
import type { ImportFile } from './lease';
import type { FileWork } from './measure-import-file';
import { writeEntries } from './write-entries';

/** Entries that are stored side by side: each waits for the volume to flush it. */
const SIDE_BY_SIDE = 4;
const NAME_LENGTH = 1_024;

/** An entry in storage, or why it alone cannot be. */
export interface TakenEntry {
  entry: string;
  /** mesh: a file of its own; beside: read with one. */
  kind: 'mesh' | 'beside';
  blob: StoredBlob | null;
  /** Bytes that the archive declares. */
  byteSize: number;
  error: MeshError | null;
}

/** Whether a file of this import is an archive that may become several: a ZIP of which nobody said that it is one asset. */
export function mayUnpack(file: Pick<ImportFile, 'name' | 'assetOverride'>): boolean {
  return extensionOf(file.name) === 'zip' && file.assetOverride === null;
}

/**
 * Unpacks a held ZIP that holds several mesh files into files of the same import, one an entry, under `archive/inner/path`, and ends it. What an archive with one mesh
 * holds is that mesh's, so it is left alone: answers false. Every entry is stored before anything is written down, in one transaction, so that a worker that dies leaves
 * nothing half done and whoever comes next begins anew. An entry that cannot be unpacked is a failed file of its own.
 * Errors: MeshError where the archive as a whole is refused; what storage and database throw.
 */
export async function unpackArchive(work: FileWork, file: ImportFile): Promise<boolean> {
  return withArchive(file, async (archive) => {
    const content = await archiveContent(archive);
    if (!isSeveral(content)) return false;
    const tooDeep = (await nestingOf(work.db, file)) >= config().archive.nesting;
    try {
      const taken = await takeAll(archive, content, tooDeep, work.lost);
      if (!work.lost?.aborted) await work.db.transaction((tx) => writeEntries(tx, work, file, taken));
    } catch (error) {
      // A limit of import, show or studio is no fault that passes.
      if (error instanceof StudioError && error.code === 'too_large') throw new MeshError({ code: 'too_large', detail: `the archive does not fit in: ${error.message}` });
      throw error;
    }
    return true;
  });
}

/** Unpacks one entry again that could not be before. Answers its blob. Errors: MeshError with the entry's name. */
export async function takeEntryAgain(work: FileWork, archiveFile: ImportFile, entry: string): Promise<StoredBlob> {
  return withArchive(archiveFile, async (archive) => {
    if (!archive.names.includes(entry)) throw new MeshError({ code: 'bad_archive', detail: `archive entry "${entry.slice(0, 120)}": it is not there` });
    const tooDeep = (await nestingOf(work.db, archiveFile)) >= config().archive.nesting;
    const { blob, error } = await takeEntry(archive, entry, 'mesh', tooDeep);
    if (error) throw error;
    return blob!;
  });
}

/** The archive lies in a file while it is open: any entry may be asked for, wherever the storage is. What a killed worker leaves is swept with the unfinished uploads. */
async function withArchive<Result>(file: Pick<ImportFile, 'sha256' | 'byteSize'>, read: (archive: Archive) => Promise<Result>): Promise<Result> {
  const temporary = pathInFolder(`${UNFINISHED}/${randomUUID()}`);
  await mkdir(path.dirname(temporary), { recursive: true });
  let archive: Archive | null = null;
  try {
    await pipeline(await openBlob(file.sha256), createWriteStream(temporary, { flags: 'wx' }));
    const { entries, totalBytes, ratio } = config().archive;
    archive = await openArchiveFile(temporary, file.byteSize, { entries, totalBytes, ratio, nameLength: NAME_LENGTH });
    return await read(archive);
  } finally {
    archive?.close();
    await rm(temporary, { force: true });
  }
}

/** A `.usdz` or an archive alone in a ZIP is unpacked too: a mesh is read out of one archive at most. */
function isSeveral({ meshes, nested }: ArchiveContent): boolean {
  const all = [...meshes, ...nested];
  return all.length > 1 || all.some((name) => ['zip', 'usdz'].includes(extensionOf(name)));
}

/** How many archives the file came out of. */
async function nestingOf(db: Database, file: Pick<ImportFile, 'archiveId'>): Promise<number> {
  let depth = 0;
  for (let above = file.archiveId; above !== null; depth++) {
    const [row] = await db.select({ archiveId: importFiles.archiveId }).from(importFiles).where(eq(importFiles.id, above));
    above = row.archiveId;
  }
  return depth;
}

async function takeAll(archive: Archive, { meshes, beside, nested }: ArchiveContent, tooDeep: boolean, lost?: AbortSignal): Promise<TakenEntry[]> {
  const waiting = [...[...meshes, ...nested].map((entry) => ({ entry, kind: 'mesh' as const })), ...beside.map((entry) => ({ entry, kind: 'beside' as const }))];
  const taken: TakenEntry[] = [];
  const takeNext = async () => {
    for (let next = waiting.shift(); next !== undefined && !lost?.aborted; next = waiting.shift()) taken.push(await takeEntry(archive, next.entry, next.kind, tooDeep));
  };
  const ends = await Promise.allSettled(Array.from({ length: SIDE_BY_SIDE }, takeNext));
  const failed = ends.find((end) => end.status === 'rejected');
  if (failed) throw failed.reason;
  return taken.sort((a, b) => (a.entry < b.entry ? -1 : 1));
}

async function takeEntry(archive: Archive, entry: string, kind: TakenEntry['kind'], tooDeep: boolean): Promise<TakenEntry> {
  const byteSize = archive.sizeOf(entry);
  const { maxFileBytes } = config();
  const faults: MeshError[] = [];
  const refused = (error: MeshError): TakenEntry => ({ entry, kind, blob: null, byteSize, error });
  if (tooDeep && extensionOf(entry) === 'zip') return refused(new MeshError({ code: 'nested_archive', found: entry.slice(0, 200), detail: `archive entry "${entry.slice(0, 120)}": expected a mesh file, found an archive in the archive: unpack it first` }));
  if (byteSize > maxFileBytes) return refused(new MeshError({ code: 'too_large', detail: `archive entry "${entry.slice(0, 120)}": expected at most ${maxFileBytes} bytes, found ${byteSize}` }));
  async function* noted(): AsyncGenerator<Uint8Array> {
    try {
      yield* archive.stream(entry);
    } catch (error) {
      if (error instanceof MeshError) faults.push(error);
      throw error;
    }
  }
  try {
    return { entry, kind, blob: await storeBlob(noted(), { maxBytes: maxFileBytes }), byteSize, error: null };
  } catch (error) {
    // The storage takes a stream that breaks off for a lost sender; what broke it is known here.
    if (faults.length > 0) return refused(faults[0]);
    throw error;
  }
}
