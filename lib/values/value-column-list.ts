import { getTableColumns, sql } from 'drizzle-orm';
import { approvals } from '@/db/schema/approvals';
import { valueColumns } from '@/db/schema/value-columns';

const columns: Record<string, { name: string }> = getTableColumns(approvals);

/** Names of the columns that a value has wherever it stands: current, approved, of an override. */
export const VALUE_COLUMN_NAMES: readonly string[] = Object.keys(valueColumns()).map((key) => columns[key].name);

/** The columns as a list of SQL, each before a table's name where one is given. */
export function valueColumnList(table?: string) {
  return sql.raw(VALUE_COLUMN_NAMES.map((name) => `${table ? `${table}.` : ''}"${name}"`).join(', '));
}
