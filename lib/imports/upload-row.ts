import { and, asc, eq } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { uploadParts } from '@/db/schema/upload-parts';
import { uploads } from '@/db/schema/uploads';
import { StudioError } from '@/lib/rules/studio-error';
import { partCount, type UploadAnswer } from '@/lib/rules/upload-parts';

export type UploadRow = typeof uploads.$inferSelect;
export type UploadPartRow = typeof uploadParts.$inferSelect;

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

export const noUpload = () => new StudioError('not_found', 'There is no such upload of yours in this show. It may have expired: announce the file again.');

/** The caller's own upload into this show; not_found for another's. The caller has checked the show. */
export async function getUploadRow(db: Executor, showId: string, userId: string, id: string): Promise<UploadRow> {
  const mine = and(eq(uploads.id, id), eq(uploads.showId, showId), eq(uploads.createdBy, userId));
  const [row] = UUID.test(id) ? await db.select().from(uploads).where(mine) : [];
  if (!row) throw noUpload();
  return row;
}

/** The parts that are there, by number. */
export function listUploadParts(db: Executor, id: string): Promise<UploadPartRow[]> {
  return db.select().from(uploadParts).where(eq(uploadParts.uploadId, id)).orderBy(asc(uploadParts.number));
}

/** The shape of an upload as `rules/upload-parts` counts it. */
export const partedOf = (row: UploadRow): { bytes: number; part_bytes: number } => ({ bytes: row.byteSize, part_bytes: row.partBytes });

/** The upload as the API tells it. */
export function describeUpload(row: UploadRow, parts: readonly UploadPartRow[], state: UploadAnswer['state']): UploadAnswer {
  return {
    state,
    upload: row.id,
    sha256: row.sha256,
    bytes: row.byteSize,
    part_bytes: row.partBytes,
    part_count: partCount(partedOf(row)),
    parts: parts.map((part) => part.number),
    expires_at: row.expiresAt.toISOString(),
  };
}
