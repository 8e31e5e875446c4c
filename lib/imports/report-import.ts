import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { csvRecord } from '@/lib/formats/csv';
import { REPORT_COLUMNS, REPORT_SCHEMA, type ReportRow } from '@/lib/rules/import-report';
import type { ReportImportInput } from '@/lib/rules/inputs/report-import';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { getImportRow } from './get-import-row';
import { reportPages } from './report-pages';

type ReportFormat = 'csv' | 'json';

interface ReportWriter {
  mediaType: string;
  head: (show: string, importId: string) => string;
  rows: (rows: readonly ReportRow[], isFirst: boolean, guard: boolean) => string;
  tail: string;
}

/** How each format writes the same rows. JSON has the CSV's columns as fields, one row a line, and is never guarded. */
const WRITERS: Record<ReportFormat, ReportWriter> = {
  csv: {
    mediaType: 'text/csv; charset=utf-8; header=present',
    head: () => csvRecord(REPORT_COLUMNS, { guard: false }),
    rows: (rows, _, guard) => rows.map((row) => csvRecord(REPORT_COLUMNS.map((column) => row[column]), { guard })).join(''),
    tail: '',
  },
  json: {
    mediaType: 'application/json; charset=utf-8',
    head: (show, importId) => `{"schema":${JSON.stringify(REPORT_SCHEMA)},"show":${JSON.stringify(show)},"import":${JSON.stringify(importId)},"items":[`,
    rows: (rows, isFirst) => rows.map((row, i) => `${isFirst && i === 0 ? '' : ','}\n${JSON.stringify(row)}`).join(''),
    tail: '\n]}\n',
  },
};

/**
 * The verb that writes an import's report: what failed and what was found, with file, line, part and what mends it, for whoever made
 * the files. It holds no mass properties, so it is no hand-off of values and leaves no receipt. Rows are read as fast as they are taken.
 * Errors: not_found for outsiders, guests and imports of other shows.
 */
export function reportImportAs(format: ReportFormat) {
  return async (context: Context, input: ReportImportInput): Promise<Response> => {
    const { db, actor } = requireActor(context);
    const { show } = await getShowAccess(db, actor, input.show, 'readShow');
    const { id } = await getImportRow(db, show.id, input.import);
    const writer = WRITERS[format];
    const pages = reportPages(db, { show: show.code, importId: id, level: input.level });
    return new Response(textStream(writtenBy(writer, { show: show.code, importId: id, guard: input.guard === '1' }, pages)), {
      headers: {
        'content-type': writer.mediaType,
        'content-disposition': `attachment; filename="${show.code}_import_${id.slice(0, 8)}.${format}"`,
        'cache-control': 'no-store',
        'x-content-type-options': 'nosniff',
      },
    });
  };
}

async function* writtenBy(writer: ReportWriter, { show, importId, guard }: { show: string; importId: string; guard: boolean }, pages: AsyncIterable<ReportRow[]>): AsyncGenerator<string> {
  yield writer.head(show, importId);
  let isFirst = true;
  for await (const rows of pages) {
    if (rows.length === 0) continue;
    yield writer.rows(rows, isFirst, guard);
    isFirst = false;
  }
  if (writer.tail !== '') yield writer.tail;
}

function textStream(chunks: AsyncGenerator<string>): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  return new ReadableStream<Uint8Array>(
    {
      async pull(controller) {
        const next = await chunks.next();
        if (next.done) controller.close();
        else controller.enqueue(encoder.encode(next.value));
      },
      async cancel() {
        await chunks.return(undefined);
      },
    },
    { highWaterMark: 0 },
  );
}
