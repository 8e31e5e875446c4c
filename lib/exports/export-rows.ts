import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { fileStream } from '@/lib/http/file-stream';
import { matchesEtag } from '@/lib/http/matches-etag';
import type { ExportRowsInput } from '@/lib/rules/inputs/export-rows';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { exportCache } from './export-cache';
import { EXPORT_WRITERS, type ExportFormat } from './export-formats';
import { selectionText } from './export-selection';
import { makeExport } from './make-export';
import { writeReceipt } from './write-receipt';

/**
 * The verb that hands a show's current values out in a format: SI, the asset's axes, one row a part, ordered by asset and part.
 * Strong ETag (SHA-256 of the bytes); 304 for who has them. A receipt is written once the last byte was taken.
 */
export function exportRowsAs(format: ExportFormat) {
  return async (context: Context, input: ExportRowsInput, request: Request): Promise<Response> => {
    const { db, actor } = requireActor(context);
    const { show } = await getShowAccess(db, actor, input.show, 'exportRows');
    const file = await makeExport(db, show, format, input);
    // no-transform: a proxy that compressed the bytes would make the tag untrue.
    const headers = { etag: `"${file.sha256}"`, 'cache-control': 'private, no-cache, no-transform', vary: 'authorization, cookie' };
    if (matchesEtag(request.headers.get('if-none-match'), file.sha256)) return new Response(null, { status: 304, headers });
    const handOff = { showId: show.id, format, selection: selectionText(input), rows: file.rows, byteSize: file.byteSize, sha256: file.sha256 };
    const send = (path: string) => fileStream(path, () => writeReceipt(db, actor, handOff, []));
    const body = await send(file.path).catch(async () => {
      // Somebody emptied the cache folder: make the file again.
      exportCache.forget(file.key);
      return send((await makeExport(db, show, format, input)).path);
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
