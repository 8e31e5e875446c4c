import { and, eq, gt, inArray, sql, type SQL } from 'drizzle-orm';
import { partCurrent as c } from '@/db/schema/part-current';
import type { ListPartsInput } from '@/lib/rules/inputs/list-parts';

export type PartFilter = Partial<Pick<ListPartsInput, 'row' | 'asset' | 'category' | 'state' | 'problem' | 'q' | 'changed_since'>>;

/** The rows of one show that a filter lets through: the one place where the show's scope is set for readers of part_current. */
export function partFilter(showId: string, filter: PartFilter): SQL | undefined {
  const { row, asset, category, state, problem, q, changed_since: changedSince } = filter;
  return and(
    eq(c.showId, showId),
    row === undefined ? undefined : eq(c.row, row),
    asset === undefined ? undefined : sql`${c.asset} = ${asset} collate "C"`,
    category === undefined ? undefined : inArray(c.category, category),
    state === undefined ? undefined : inArray(c.state, state),
    problem === undefined ? undefined : problemCondition(problem),
    q ? searchCondition(q) : undefined,
    changedSince === undefined ? undefined : gt(c.changedRevision, changedSince),
  );
}

function problemCondition(code: string): SQL {
  if (code === 'any') return sql`cardinality(${c.problemCodes}) > 0`;
  return sql`(${code} = any(${c.problemCodes}) or ${code} = any(string_to_array(${c.warnings}, ' ')))`;
}

/** Every word of the search has to stand somewhere in asset, part, material or outside id, whatever its case. */
function searchCondition(q: string): SQL | undefined {
  const haystack = sql`concat_ws(' ', ${c.asset}, ${c.part}, ${c.material}, ${c.outsideId})`;
  return and(...q.split(/\s+/).map((word) => sql`${haystack} ilike ${`%${word.replace(/[\\%_]/g, '\\$&')}%`}`));
}
