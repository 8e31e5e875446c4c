import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { fileStream } from '@/lib/http/file-stream';
import { matchesEtag } from '@/lib/http/matches-etag';
import type { ExportRowsInput } from '@/lib/rules/inputs/export-rows';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { exportCache, type ExportFile } from './export-cache';
import { EXPORT_WRITERS, type ExportFormat } from './export-formats';
import { selectionText } from './export-selection';
import { readHandedRows } from './handed-rows';
import { makeExport } from './make-export';
import { writeReceipt } from './write-receipt';

/**
 * The verb that hands a show's current values out in a format: SI, the asset's axes, one row a part, ordered by asset and part.
 * Strong ETag (SHA-256 of the bytes); 304 for who has them. A receipt is written once the last byte was taken, and names the value
 * of every row in those bytes.
 */
export function exportRowsAs(format: ExportFormat) {
  return async (context: Context, input: ExportRowsInput, request: Request): Promise<Response> => {
    const { db, actor } = requireActor(context);
    const { show } = await getShowAccess(db, actor, input.show, 'exportRows');
    const file = await makeExport(db, show, format, input);
    // no-transform: a proxy that compressed the bytes would make the tag untrue.
    const headers = { etag: `"${file.sha256}"`, 'cache-control': 'private, no-cache, no-transform', vary: 'authorization, cookie' };
    if (matchesEtag(request.headers.get('if-none-match'), file.sha256)) return new Response(null, { status: 304, headers });
    const send = ({ path, rows, byteSize, sha256 }: ExportFile) =>
      fileStream(path, byteSize, (handle) => writeReceipt(db, actor, { showId: show.id, format, selection: selectionText(input), rows, byteSize, sha256 }, readHandedRows(handle, byteSize, rows)));
    const body = await send(file).catch(async () => {
      // Somebody emptied the cache folder: make the file again.
      exportCache.forget(file.key);
      return send(await makeExport(db, show, format, input));
    });
    return new Response(body, {
      headers: {
        ...headers,
        'content-type': EXPORT_WRITERS[format].mediaType,
        'content-length': String(file.byteSize),
        'content-disposition': `attachment; filename="${show.code}_parts.${format}"`,
        'x-content-type-options': 'nosniff',
      },
    });
  };
}
