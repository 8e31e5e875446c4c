import { sql } from 'drizzle-orm';
import { partCurrent } from '@/db/schema/part-current';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { csvRecord } from '@/lib/formats/csv';
import { CSV_COLUMNS } from '@/lib/rules/csv-columns';
import type { ExportPreview } from '@/lib/rules/export-preview';
import type { ExportRowsInput } from '@/lib/rules/inputs/export-rows';
import { getShowAccess } from '@/lib/shows/get-show-access';
import { exportPages } from './export-pages';
import { exportCondition } from './export-selection';

const PREVIEW_ROWS = 20;

/** The first rows of an export, each cell as the CSV will have it, and how long the file will be. */
export async function previewExport(context: Context, input: ExportRowsInput): Promise<ExportPreview> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'exportRows');
  const [{ total, withoutMass }] = await db
    .select({ total: sql<number>`count(*)::integer`, withoutMass: sql<number>`count(*) filter (where ${partCurrent.massKg} is null)::integer` })
    .from(partCurrent)
    .where(exportCondition(show.id, input));
  const rows: string[][] = [];
  for await (const page of exportPages(db, show, input, PREVIEW_ROWS)) {
    rows.push(...page.map((cells) => cells.map((cell) => (typeof cell === 'number' ? csvRecord([cell], { guard: false }).trimEnd() : (cell ?? '')))));
  }
  return { columns: CSV_COLUMNS.map((column) => column.name), rows, total, without_mass: withoutMass };
}
