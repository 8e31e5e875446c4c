import { sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { massWords } from '@/lib/rules/mass-words';

/** Approved values in words, such as `585.1 kg (v012)`, by value_id. */
export async function valueFacts(db: Executor, valueIds: readonly string[]): Promise<Map<string, string>> {
  if (valueIds.length === 0) return new Map();
  const { rows } = await db.execute<{ id: string; version: string; mass_kg: number }>(sql`
    select id, version, mass_kg from approvals where id = any(${sql.param([...new Set(valueIds)])}::uuid[])`);
  return new Map(rows.map((row) => [row.id, `${massWords(row.mass_kg)} (${row.version})`]));
}
