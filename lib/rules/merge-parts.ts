import { partKey } from './part-key';
import type { AssetTotal, PartCounts, PartPage, PartRow } from './part-row';

/** What an answer brings that is newer than the pages read before. */
export interface NewerParts {
  items: readonly PartRow[];
  assets?: readonly AssetTotal[];
  counts?: PartCounts | null;
  /** The show's revision that they were read at. */
  revision?: number;
}

/** Puts newer rows and totals in the place of the older ones; a row with an older revision than the one held is not taken. */
export function mergeParts(pages: readonly PartPage[], newer: NewerParts): PartPage[] {
  const rows = new Map(newer.items.map((row) => [partKey(row), row]));
  const totals = new Map((newer.assets ?? []).map((total) => [total.asset, total]));
  return pages.map((page, index) => ({
    ...page,
    items: page.items.map((held) => {
      const row = rows.get(partKey(held));
      return row !== undefined && row.revision >= held.revision ? row : held;
    }),
    assets: page.assets.map((held) => totals.get(held.asset) ?? held),
    counts: index === 0 && newer.counts ? newer.counts : page.counts,
    revision: newer.revision ?? page.revision,
  }));
}
