import type { MaterialOption } from './show-frame';

/** A material with its source; one of the two densities is given. `low` and `high` bound what the source allows. */
export interface MaterialRow extends MaterialOption {
  scope: 'show' | 'studio';
  low: number | null;
  high: number | null;
  source: string;
  from_memory: boolean;
  revision: number;
}

/** Answer of GET /api/v1/shows/{show}/materials. */
export interface MaterialPage {
  items: MaterialRow[];
  next_cursor: string | null;
}
