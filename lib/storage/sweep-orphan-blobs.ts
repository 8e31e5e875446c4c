import { and, eq, lt, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { blobs } from '@/db/schema/blobs';
import { config } from '@/lib/config';
import { log } from '@/lib/log';
import { BLOBS, blobKey, disk } from './disk';
import { listStored } from './list-stored';

const AT_MOST = 1000;

/** What refers to a blob: files of imports, and measurements, whose display meshes are made of it again. */
const isReferredTo = sql`(exists (select 1 from import_files f where f.sha256 = blobs.sha256) or exists (select 1 from geometry_records r where r.content_sha256 = blobs.sha256))`;

/**
 * Removes blobs that nothing refers to, once their grace time is over. Each in one transaction that holds the blob's row while the bytes go:
 * who stores the same bytes meanwhile waits for it and then stores them afresh; who registers them finds the row gone. Answers how many.
 */
export async function sweepOrphanBlobs(db: Database): Promise<number> {
  const isOld = lt(blobs.seenAt, sql`now() - make_interval(secs => ${config().orphanHours * 3600})`);
  const found = await db.select({ sha256: blobs.sha256 }).from(blobs).where(and(isOld, sql`not ${isReferredTo}`)).limit(AT_MOST);
  let removed = 0;
  for (const { sha256 } of found) {
    const isGone = await db.transaction(async (tx) => {
      const [held] = await tx.select({ sha256: blobs.sha256 }).from(blobs).where(and(eq(blobs.sha256, sha256), isOld)).for('update', { skipLocked: true });
      if (!held) return false;
      // A statement of its own: it sees what was registered while the row was waited for.
      const gone = await tx.delete(blobs).where(and(eq(blobs.sha256, sha256), sql`not ${isReferredTo}`)).returning({ sha256: blobs.sha256 });
      if (gone.length === 0) return false;
      await (await disk()).delete(blobKey(sha256));
      return true;
    });
    if (isGone) removed++;
  }
  if (removed > 0) log.info({ blobs: removed }, 'blobs that nothing refers to were removed');
  return removed;
}

/** Removes files among the blobs that the database knows nothing of, once they are as old as the grace time. Answers how many. */
export async function sweepUnknownFiles(db: Database): Promise<number> {
  const before = Date.now() - config().orphanHours * 3_600_000;
  let removed = 0;
  for await (const { key, byteSize, modified } of listStored(BLOBS)) {
    const sha256 = key.slice(key.lastIndexOf('/') + 1);
    if (modified.getTime() > before || !/^[0-9a-f]{64}$/.test(sha256) || key !== blobKey(sha256)) continue;
    const isGone = await db.transaction(async (tx) => {
      // The row is ours while the file goes, so that who stores the same bytes waits.
      const mine = await tx.insert(blobs).values({ sha256, byteSize }).onConflictDoNothing().returning({ sha256: blobs.sha256 });
      if (mine.length === 0) return false;
      await (await disk()).delete(key);
      await tx.delete(blobs).where(eq(blobs.sha256, sha256));
      return true;
    });
    if (isGone) removed++;
  }
  if (removed > 0) log.info({ files: removed }, 'stored files that the database does not know were removed');
  return removed;
}
