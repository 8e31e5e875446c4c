import { and, desc, eq, inArray, isNull, or, sql } from 'drizzle-orm';
import type { Executor } from '@/db/client';
import { materials } from '@/db/schema/materials';
import type { MaterialNow } from '@/lib/values/value-inputs';

/** Materials by lower-case name: the show's own where it has one of that name, else the studio's. Names that nobody knows are absent. */
export async function findMaterials(db: Executor, showId: string, names: readonly string[]): Promise<Map<string, MaterialNow>> {
  const wanted = [...new Set(names.map((name) => name.toLowerCase()))];
  if (wanted.length === 0) return new Map();
  const rows = await db
    .select({
      id: materials.id,
      name: materials.name,
      revision: materials.revision,
      densityKgPerM3: materials.densityKgPerM3,
      arealDensityKgPerM2: materials.arealDensityKgPerM2,
    })
    .from(materials)
    .where(and(or(eq(materials.showId, showId), isNull(materials.showId)), inArray(sql`lower(${materials.name})`, wanted)))
    .orderBy(desc(isNull(materials.showId)));
  return new Map(rows.map((row) => [row.name.toLowerCase(), row]));
}
