import type { Database } from '@/db/client';
import { materials } from '@/db/schema/materials';
import { STUDIO_MATERIALS } from './materials';

/** Puts the studio's material library into the database; names that are there stay as they are. */
export async function seedMaterials(db: Database): Promise<void> {
  await db.insert(materials).values(STUDIO_MATERIALS.map((material) => ({ ...material, showId: null }))).onConflictDoNothing();
}
