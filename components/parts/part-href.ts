import { rowName } from '@/lib/rules/part-key';
import type { PartRow } from '@/lib/rules/part-row';

/** Address of a part's own page. */
export function partHref(show: string, row: PartRow): string {
  return `/shows/${encodeURIComponent(show)}/assets/${encodeURIComponent(row.asset)}/${encodeURIComponent(rowName(row))}`;
}
