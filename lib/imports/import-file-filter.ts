import { sql, type SQL } from 'drizzle-orm';
import { LOUD_REMARKS, type FileFilter, type FileSort } from '@/lib/rules/import-answer';

const failed = sql`f.state = 'failed'`;
const hasProblems = sql`coalesce(f.problems, 0) > 0`;
const isLoud = sql`(string_to_array(coalesce(f.remark, ''), ' ') && ${sql.param([...LOUD_REMARKS])}::text[]
  or exists (select 1 from findings n where n.record_id = v.record_id and n.severity = 'warning'))`;

/** The files that each filter lets through, as SQL on the tables of `FILE_TABLES`. */
export const FILE_CONDITIONS: Record<FileFilter, SQL> = {
  all: sql`true`,
  failed,
  problems: hasProblems,
  warnings: isLoud,
  going: sql`f.state in ('queued', 'reading', 'measuring')`,
  unchanged: sql`'unchanged' = any(string_to_array(coalesce(f.remark, ''), ' '))`,
};

/** Every word of the search has to stand in the file's path or its asset, whatever its case. */
export function searchFiles(q: string): SQL {
  const words = q.split(/\s+/).filter((word) => word !== '');
  return words.reduce((all, word) => sql`${all} and concat_ws(' ', f.name, a.code, f.asset_override) ilike ${`%${word.replace(/[\\%_]/g, '\\$&')}%`}`, sql`true`);
}

const name = sql`f.name collate "C"`;

/** What a sort orders by before the name: a number, or text by code point. */
const SORT_KEYS: Record<string, { key: SQL; isText: boolean }> = {
  needs: { key: sql`(case when ${failed} then 0 when ${hasProblems} then 1 when ${isLoud} then 2 else 3 end)`, isText: false },
  name: { key: name, isText: true },
  asset: { key: sql`coalesce(a.code, f.asset_override, '') collate "C"`, isText: true },
  parts: { key: sql`coalesce(f.parts, -1)`, isText: false },
  problems: { key: sql`coalesce(f.problems, -1)`, isText: false },
  bytes: { key: sql`f.byte_size`, isText: false },
};

interface FileOrder {
  /** Selected as `sort_key`, which a cursor holds. */
  key: SQL;
  orderBy: SQL;
  after: (at: { key: string; name: string }) => SQL;
}

/** Order of a page and where the next one begins. Files are told apart by name, so no order has ties. */
export function fileOrder(sort: FileSort): FileOrder {
  const isDown = sort.startsWith('-');
  const { key, isText } = SORT_KEYS[isDown ? sort.slice(1) : sort];
  const direction = isDown ? sql`desc` : sql`asc`;
  const beyond = isDown ? sql`<` : sql`>`;
  const value = (text: string) => (isText ? sql`${text}::text collate "C"` : sql`${text}::float8`);
  return {
    key: sql`(${key})::text`,
    orderBy: sql`${key} ${direction}, ${name}`,
    after: (at) => sql`(${key} ${beyond} ${value(at.key)} or (${key} = ${value(at.key)} and ${name} > ${at.name}::text collate "C"))`,
  };
}
