import { and, ne, type SQL } from 'drizzle-orm';
import { partCurrent } from '@/db/schema/part-current';
import { partFilter } from '@/lib/parts/part-filter';
import type { ExportRowsInput } from '@/lib/rules/inputs/export-rows';

export type ExportSelection = Pick<ExportRowsInput, 'state' | 'category' | 'asset' | 'guard'>;

/** The selection as a canonical query string: the same rows and bytes have the same text. */
export function selectionText({ state, category, asset, guard }: ExportSelection): string {
  const query = new URLSearchParams();
  if (asset !== undefined) query.set('asset', asset);
  if (category !== undefined) query.set('category', [...new Set(category)].sort().join(','));
  if (guard === '1') query.set('guard', '1');
  if (state !== undefined) query.set('state', [...new Set(state)].sort().join(','));
  return query.toString();
}

/** Rows of a show that an export holds: what is left out is in none. */
export function exportCondition(showId: string, { state, category, asset }: Omit<ExportSelection, 'guard'>): SQL | undefined {
  return and(partFilter(showId, { row: 'part', state, category, asset }), ne(partCurrent.state, 'left_out'));
}
