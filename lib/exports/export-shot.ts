import { createHash } from 'node:crypto';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { matchesEtag } from '@/lib/http/matches-etag';
import type { ExportShotInput } from '@/lib/rules/inputs/export-shot';
import { StudioError } from '@/lib/rules/studio-error';
import { findShot } from '@/lib/shots/find-shot';
import { getShowAccess, type ShowAccess } from '@/lib/shows/get-show-access';
import { EXPORT_WRITERS, type ExportFormat } from './export-formats';
import { readLockedRows } from './read-locked-rows';
import { writeReceipt } from './write-receipt';

/**
 * The verb that hands out what is locked for a shot: the same bytes for as long as the locks stand. Strong ETag (SHA-256 of the
 * bytes), 304 for who has them; a receipt names the locks that were taken. A guest gets the shots they are invited to, and of
 * other shots the assets they are invited to.
 */
export function exportShotAs(format: ExportFormat) {
  return async (context: Context, input: ExportShotInput, request: Request): Promise<Response> => {
    const { db, actor } = requireActor(context);
    const access = await getShowAccess(db, actor, input.show, 'readLocked');
    const { show } = access;
    const shot = await findShot(db, show.id, input.shot);
    const assets = assetsOf(access, shot.code);
    const locked = await readLockedRows(db, shot.id, assets);
    const writer = EXPORT_WRITERS[format];
    const bytes = Buffer.from(writer.head(show.code) + writer.rows(locked.map((row) => row.cells), true, input.guard === '1') + writer.tail, 'utf8');
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const headers = { etag: `"${sha256}"`, 'cache-control': 'private, no-cache, no-transform', vary: 'authorization, cookie' };
    if (matchesEtag(request.headers.get('if-none-match'), sha256)) return new Response(null, { status: 304, headers });
    const selection = new URLSearchParams({ ...(input.guard === '1' ? { guard: '1' } : {}), shot: shot.code }).toString();
    await writeReceipt(db, actor, { showId: show.id, shotId: shot.id, format, selection, rows: locked.length, byteSize: bytes.length, sha256 }, [locked]);
    return new Response(bytes, {
      headers: {
        ...headers,
        'content-type': writer.mediaType,
        'content-length': String(bytes.length),
        'content-disposition': `attachment; filename="${show.code}_${shot.code}.${format}"`,
        'x-content-type-options': 'nosniff',
      },
    });
  };
}

/** Codes of assets that the caller is limited to in a shot; null for all. A guest who is invited to neither gets not_found. */
function assetsOf({ role, shots, assets }: ShowAccess, shot: string): string[] | null {
  if (role !== 'guest' || shots.some((code) => code.toLowerCase() === shot.toLowerCase())) return null;
  if (assets.length === 0) throw new StudioError('not_found', `There is no shot ${shot}.`);
  return assets;
}
