import { and, eq } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { imports } from '@/db/schema/imports';
import { StudioError } from '@/lib/rules/studio-error';

export type ImportRow = typeof imports.$inferSelect;

const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

/** The import of this show; not_found for one of another show. The caller has checked the show. */
export async function getImportRow(db: Executor, showId: string, id: string): Promise<ImportRow> {
  const [row] = UUID.test(id) ? await db.select().from(imports).where(and(eq(imports.id, id), eq(imports.showId, showId))) : [];
  if (!row) throw new StudioError('not_found', 'There is no such import in this show.');
  return row;
}
