import { getTableColumns, sql } from 'drizzle-orm';
import { uploads } from '@/db/schema/uploads';
import { config } from '@/lib/config';
import type { Context } from '@/lib/context';
import type { AnnounceUploadInput } from '@/lib/rules/inputs/announce-upload';
import { partCount, type UploadAnswer } from '@/lib/rules/upload-parts';
import { countAgainst } from '@/lib/storage/count-against';
import { findKnownContent } from './find-known-content';
import { getOpenImport } from './get-open-import';
import { refuseBeyond } from './refuse-beyond';
import { registerFile } from './register-file';
import { describeUpload, listUploadParts } from './upload-row';

/**
 * Announces a file that comes in parts and reserves its bytes in show and studio. Answers which parts are there, from an earlier try of the
 * same person too, whatever import that was for; or `stored`, when no bytes are needed. Announcing again is as once. Errors: too_large, conflict.
 */
export async function announceUpload(context: Context, input: AnnounceUploadInput): Promise<UploadAnswer> {
  const { known, show, row } = await getOpenImport(context, input);
  const { bytes, sha256, part_bytes } = input;
  await refuseBeyond(context.db, row, input.name, bytes);
  const there = await findKnownContent(context.db, known.actor, [{ sha256, bytes }]);
  if (there.has(sha256)) {
    await context.db.transaction((tx) => registerFile(tx, row, input, { sha256, byteSize: bytes }));
    return { state: 'stored', upload: null, sha256, bytes, part_bytes, part_count: partCount({ bytes, part_bytes }), parts: [], expires_at: null };
  }
  const u = uploads;
  return context.db.transaction(async (tx) => {
    const expiresAt = sql`now() + make_interval(secs => ${config().uploadHours * 3600})`;
    // One that ended or ran out begins afresh; what is under way keeps its parts, and with them its size of a part.
    const isOver = sql`(${u.completedAt} is not null or ${u.refusedAt} is not null or ${u.expiresAt} <= now() or ${u.byteSize} <> excluded.byte_size)`;
    const [upload] = await tx
      .insert(u)
      .values({ showId: show.id, createdBy: known.actor.userId, sha256, byteSize: bytes, partBytes: part_bytes, expiresAt })
      .onConflictDoUpdate({
        target: [u.showId, u.createdBy, u.sha256],
        set: {
          expiresAt: sql`excluded.expires_at`,
          byteSize: sql`excluded.byte_size`,
          createdAt: sql`case when ${isOver} then now() else ${u.createdAt} end`,
          partBytes: sql`case when ${isOver} then excluded.part_bytes else ${u.partBytes} end`,
          completedAt: null,
          refusedAt: null,
        },
      })
      .returning({ ...getTableColumns(u), began: sql<boolean>`created_at = now()` });
    if (upload.began) {
      await tx.execute(sql`delete from upload_parts where upload_id = ${upload.id}`);
      await countAgainst(tx, { kind: 'show', showId: show.id }, bytes, true);
      await countAgainst(tx, { kind: 'studio' }, bytes, true);
    }
    return describeUpload(upload, await listUploadParts(tx, upload.id), 'open');
  });
}
