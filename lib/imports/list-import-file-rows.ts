import { sql } from 'drizzle-orm';
import { z } from 'zod';
import type { Executor } from '@/db/client';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { readCursor, writeCursor } from '@/lib/http/cursor-text';
import { FILE_FILTERS, FINDINGS_SHOWN, type FileFilterCounts, type FileFinding, type ImportFilePage } from '@/lib/rules/import-answer';
import type { ListImportFilesInput } from '@/lib/rules/inputs/list-import-files';
import { StudioError } from '@/lib/rules/studio-error';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { getImportRow } from './get-import-row';
import { FILE_CONDITIONS, fileOrder, searchFiles } from './import-file-filter';
import { FILE_COLUMNS, FILE_TABLES, toFileAnswer, type FileRow } from './list-import-files';

interface PagedRow extends FileRow {
  sort_key: string;
  planned_asset: string | null;
  planned_version: number | null;
  warnings: number;
  findings: FileFinding[];
}

const cursorShape = z.tuple([z.string(), z.string(), z.string()]);

/**
 * A page of an import's files, filtered, searched and sorted in the database, each with its first problems and warnings.
 * Errors: not_found for outsiders, guests and imports of other shows; bad_input for a cursor of another order.
 */
export async function listImportFileRows(context: Context, input: ListImportFilesInput): Promise<ImportFilePage> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const { id } = await getImportRow(db, show.id, input.import);
  const order = fileOrder(input.sort);
  const at = input.cursor === undefined ? null : decodeCursor(input.cursor, input.sort);
  const chosen = sql`f.import_id = ${id} and ${FILE_CONDITIONS[input.only]} and ${searchFiles(input.q)}`;
  return db.transaction(
    async (tx) => {
      const { rows } = await tx.execute<PagedRow>(sql`
        select ${FILE_COLUMNS}, ${order.key} as sort_key, f.plan ->> 'asset' as planned_asset, (f.plan ->> 'version')::integer as planned_version, ${WARNINGS} as warnings, ${FINDINGS} as findings
        from ${FILE_TABLES} where ${chosen} and ${at === null ? sql`true` : order.after(at)} order by ${order.orderBy} limit ${input.limit + 1}`);
      const page = rows.slice(0, input.limit);
      const [{ found }] = (await tx.execute<{ found: number }>(sql`select count(*)::int as found from ${FILE_TABLES} where ${chosen}`)).rows;
      return {
        items: page.map((row) => ({ ...toFileAnswer(row), planned: row.planned_asset === null ? null : { asset: row.planned_asset, version: row.planned_version }, warnings: row.warnings, findings: row.findings })),
        counts: await countByFilter(tx, id),
        found,
        next_cursor: rows.length > input.limit ? encodeCursor(input.sort, page[page.length - 1]) : null,
      };
    },
    { isolationLevel: 'repeatable read', accessMode: 'read only' },
  );
}

const WARNINGS = sql`(select count(*)::int from findings n where n.record_id = v.record_id and n.severity = 'warning')`;

const FINDINGS = sql`coalesce((select json_agg(json_build_object('code', n.code, 'severity', n.severity, 'message', n.message, 'part', n.part, 'count', n.count,
    'line', (select min((p ->> 'line')::int) from jsonb_array_elements(n.places) p)))
  from (select * from findings n where n.record_id = v.record_id and n.severity in ('problem', 'warning') order by n.severity, n.ordinal limit ${FINDINGS_SHOWN}) n), '[]'::json)`;

async function countByFilter(tx: Executor, importId: string): Promise<FileFilterCounts> {
  const counts = FILE_FILTERS.map((filter) => sql`count(*) filter (where ${FILE_CONDITIONS[filter]})::int as ${sql.identifier(filter)}`);
  const { rows } = await tx.execute<FileFilterCounts & Record<string, unknown>>(sql`select ${sql.join(counts, sql`, `)} from ${FILE_TABLES} where f.import_id = ${importId}`);
  return rows[0];
}

function encodeCursor(sort: string, last: PagedRow): string {
  return writeCursor([sort, last.sort_key, last.name]);
}

function decodeCursor(text: string, sort: string): { key: string; name: string } {
  const [sortedBy, key, name] = readCursor(text, cursorShape);
  if (sortedBy !== sort) throw new StudioError('bad_input', 'cursor: This cursor belongs to a list in another order.', { field: 'cursor' });
  return { key, name };
}
