import { eq, sql } from 'drizzle-orm';
import { pipeline } from 'node:stream/promises';
import { Writable } from 'node:stream';
import type { Database } from '@/db/client';
import { blobs } from '@/db/schema/blobs';
import { uploadParts } from '@/db/schema/upload-parts';
import { config } from '@/lib/config';
import { blobKey, BLOBS, disk, partKey } from './disk';
import { listByFolder, type StoredFile } from './list-stored';
import { openBlob } from './open-blob';
import { isTransientStorageFault } from './storage-fault';
import { sizeInStorage } from './size-in-storage';
import { sweepOrphanBlobs, sweepUnknownFiles } from './sweep-orphan-blobs';

/**
 * What is wrong with one stored file. `missing`: the database has it, the storage does not. `orphan`: nothing refers to it. `unknown`: the
 * storage has it, the database does not. `strange`: no name of ours. `part`: a part of an upload that goes on is not there.
 */
export type StorageFaultKind = 'missing' | 'wrong_size' | 'wrong_hash' | 'orphan' | 'unknown' | 'strange' | 'part';

export interface StorageFault {
  kind: StorageFaultKind;
  key: string;
  /** Bytes that the database says it has; null where it does not know the file. */
  byteSize: number | null;
  /** Bytes that lie in storage; null where none do. */
  storedBytes: number | null;
  /** Files, assets and versions that need it. */
  concerns: Concern[];
  /** What `mend` did about it. */
  mended: 'removed' | 'asked_again' | null;
}

export interface Concern {
  show: string;
  file: string;
  asset: string | null;
  version: string | null;
}

export interface StorageCheck {
  blobs: number;
  bytes: number;
  faults: StorageFault[];
}

interface CheckOptions {
  /** Reads every file and compares its hash. */
  deep: boolean;
  /** Removes what is wrong and can be sent again, and what nothing needs any more. Nothing that could still be right is touched. */
  mend: boolean;
}

/** Compares database and storage, a 256th at a time. Files younger than the grace time are not called orphans: they may be on their way. */
export async function checkStorage(db: Database, options: CheckOptions): Promise<StorageCheck> {
  const found: StorageCheck = { blobs: 0, bytes: 0, faults: [] };
  const graceBefore = Date.now() - config().orphanHours * 3_600_000;
  const folders = listByFolder(BLOBS)[Symbol.asyncIterator]();
  let folder = await folders.next();
  for (let prefix = 0; prefix < 256; prefix++) {
    const head = prefix.toString(16).padStart(2, '0');
    const stored = new Map<string, StoredFile>();
    for (; !folder.done && folder.value.name <= head; folder = await folders.next()) for (const [key, file] of folder.value.files) stored.set(key, file);
    const { rows } = await db.execute<BlobRow>(sql`
      select sha256, byte_size, seen_at,
        exists (select 1 from import_files f where f.sha256 = b.sha256) or exists (select 1 from geometry_records r where r.content_sha256 = b.sha256) as needed
      from blobs b where sha256 >= ${head} and sha256 < ${`${head}g`} order by sha256`);
    for (const row of rows) {
      found.blobs++;
      found.bytes += Number(row.byte_size);
      const key = blobKey(row.sha256);
      const fault = await checkBlob(db, row, stored.get(key) ?? null, graceBefore, options.deep);
      if (fault) found.faults.push(await mendBlob(db, row, fault, options.mend));
      stored.delete(key);
    }
    found.faults.push(...unknownFiles(stored.values(), graceBefore, options.mend));
  }
  for (; !folder.done; folder = await folders.next()) found.faults.push(...unknownFiles(folder.value.files.values(), graceBefore, options.mend));
  found.faults.push(...(await checkParts(db, options.mend)));
  if (options.mend) {
    let removed: number;
    do removed = await sweepOrphanBlobs(db);
    while (removed > 0);
    await sweepUnknownFiles(db);
  }
  return found;
}

type BlobRow = { sha256: string; byte_size: string; seen_at: string; needed: boolean };

/** Files without a row: old ones of ours, and whatever has no name of ours. */
function unknownFiles(files: Iterable<StoredFile>, graceBefore: number, mend: boolean): StorageFault[] {
  return [...files].flatMap(({ key, byteSize, modified }) => {
    const name = key.slice(key.lastIndexOf('/') + 1);
    const isOurs = /^[0-9a-f]{64}$/.test(name) && key === blobKey(name);
    if (isOurs && modified.getTime() > graceBefore) return [];
    return [{ kind: isOurs ? ('unknown' as const) : ('strange' as const), key, byteSize: null, storedBytes: byteSize, concerns: [], mended: isOurs && mend ? ('removed' as const) : null }];
  });
}

async function checkBlob(db: Database, row: BlobRow, stored: { byteSize: number } | null, graceBefore: number, deep: boolean): Promise<StorageFault | null> {
  const byteSize = Number(row.byte_size);
  const isYoung = new Date(row.seen_at).getTime() > graceBefore;
  const fault = async (kind: StorageFaultKind): Promise<StorageFault> => ({
    kind,
    key: blobKey(row.sha256),
    byteSize,
    storedBytes: stored?.byteSize ?? null,
    concerns: row.needed ? await concernsOf(db, row.sha256) : [],
    mended: null,
  });
  if (!row.needed) return isYoung ? null : fault('orphan');
  // Looked for once more: it may have come since the storage was listed.
  if (!stored && (await sizeInStorage(blobKey(row.sha256))) === null) return fault('missing');
  if (stored && stored.byteSize !== byteSize) return fault('wrong_size');
  if (deep && stored && !(await hasItsHash(row.sha256))) return fault('wrong_hash');
  return null;
}

async function hasItsHash(sha256: string): Promise<boolean> {
  try {
    await pipeline(await openBlob(sha256), new Writable({ write: (_chunk, _encoding, done) => done() }));
    return true;
  } catch (error) {
    // A storage that is not reached says nothing about the file.
    if (isTransientStorageFault(error)) throw error;
    return false;
  }
}

/** A damaged file is removed so that the same bytes, sent again, take its place. An orphan is left to the sweep, which knows how. */
async function mendBlob(db: Database, row: BlobRow, fault: StorageFault, mend: boolean): Promise<StorageFault> {
  if (!mend) return fault;
  if (fault.kind === 'orphan') return { ...fault, mended: 'removed' };
  if (fault.kind !== 'wrong_size' && fault.kind !== 'wrong_hash') return fault;
  await db.transaction(async (tx) => {
    await tx.select({ sha256: blobs.sha256 }).from(blobs).where(eq(blobs.sha256, row.sha256)).for('update');
    await (await disk()).delete(fault.key);
  });
  return { ...fault, mended: 'removed' };
}

async function checkParts(db: Database, mend: boolean): Promise<StorageFault[]> {
  const faults: StorageFault[] = [];
  for (const part of await db.select().from(uploadParts)) {
    const key = partKey(part.uploadId, part.number, part.sha256);
    const storedBytes = await sizeInStorage(key);
    if (storedBytes === part.byteSize) continue;
    if (mend) {
      await db.delete(uploadParts).where(sql`${uploadParts.uploadId} = ${part.uploadId} and ${uploadParts.number} = ${part.number} and ${uploadParts.sha256} = ${part.sha256}`);
      await (await disk()).delete(key);
    }
    faults.push({ kind: 'part', key, byteSize: part.byteSize, storedBytes, concerns: [], mended: mend ? 'asked_again' : null });
  }
  return faults;
}

async function concernsOf(db: Database, sha256: string): Promise<Concern[]> {
  const { rows } = await db.execute<{ show: string; file: string; asset: string | null; version: string | null }>(sql`
    select s.code as show, f.name as file, a.code as asset, v.label as version
    from import_files f join imports i on i.id = f.import_id join shows s on s.id = i.show_id
      left join assets a on a.id = f.asset_id left join asset_versions v on v.id = f.version_id
    where f.sha256 = ${sha256} order by s.code, f.uploaded_at desc limit 50`);
  return rows;
}
