import { eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { METRES_PER } from '@/lib/rules/units';
import type { ShowSpace } from './refuse-other-space';

/** What lengths and axes of a show mean; both are frozen once it has an import. */
export async function showSpace(db: Database, showId: string): Promise<ShowSpace> {
  const [show] = await db.select({ unit: shows.linearUnit, upAxis: shows.upAxis }).from(shows).where(eq(shows.id, showId));
  return { metresPerUnit: METRES_PER[show.unit], upAxis: show.upAxis };
}
