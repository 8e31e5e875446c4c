import { and, eq, gt, isNull, notExists, or, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { materials } from '@/db/schema/materials';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ListMaterialsInput } from '@/lib/rules/inputs/list-materials';
import type { MaterialPage } from '@/lib/rules/material-row';
import { getShowAccess } from '@/lib/shows/get-show-access';

/**
 * Materials by name, the show's own and the studio's; one of the studio whose name the show has taken is hidden, since that name
 * now means the show's. Every word of `q` has to stand in name, category or source.
 */
export async function listMaterials(context: Context, input: ListMaterialsInput): Promise<MaterialPage> {
  const { db, actor } = requireActor(context);
  const { show } = await getShowAccess(db, actor, input.show, 'readShow');
  const m = materials;
  const own = alias(materials, 'own');
  const hidden = db
    .select({ id: own.id })
    .from(own)
    .where(and(eq(own.showId, show.id), sql`lower(${own.name}) = lower(${m.name})`));
  const name = sql<string>`lower(${m.name}) collate "C"`;
  const words = (input.q ?? '').split(/\s+/).filter((word) => word !== '');
  const rows = await db
    .select()
    .from(m)
    .where(
      and(
        or(eq(m.showId, show.id), and(isNull(m.showId), notExists(hidden))),
        input.category === undefined ? undefined : eq(m.category, input.category),
        input.cursor === undefined ? undefined : gt(name, sql`${input.cursor}::text collate "C"`),
        ...words.map((word) => sql`concat_ws(' ', ${m.name}, ${m.category}, ${m.source}) ilike ${`%${word.replace(/[\\%_]/g, '\\$&')}%`}`),
      ),
    )
    .orderBy(name)
    .limit(input.limit + 1);
  const page = rows.slice(0, input.limit);
  return {
    items: page.map((row) => ({
      name: row.name,
      scope: row.showId === null ? 'studio' : 'show',
      category: row.category,
      density_kg_m3: row.densityKgPerM3,
      areal_density_kg_m2: row.arealDensityKgPerM2,
      low: row.low,
      high: row.high,
      source: row.source,
      from_memory: row.fromMemory,
      revision: row.revision,
    })),
    next_cursor: rows.length > input.limit ? page[page.length - 1].name.toLowerCase() : null,
  };
}
