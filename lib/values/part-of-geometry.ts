import { sql } from 'drizzle-orm';

/**
 * Joins a version's geometry (aliases a for the asset, g for geometry_parts) to the part that it is: the one of its name, or the one that
 * this name stands for since a rename. Of a version that has both names, the older one is a part of its own.
 */
export const PART_OF_GEOMETRY = sql`
  join parts n on n.asset_id = a.id and n.name = g.name
  join parts p on p.id = coalesce(n.merged_into, n.id) and (n.merged_into is null or not exists (
    select 1 from geometry_parts both_names where both_names.record_id = g.record_id and both_names.name = p.name))`;
