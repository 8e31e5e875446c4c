import { eq } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { shows } from '@/db/schema/shows';
import { METRES_PER, type OtherSpace } from '@/lib/rules/units';
import type { ShowSpace } from './file-space';

/** What lengths and axes of a show mean, both frozen once it has an import; `other` is what this import does with files that state others. */
export async function showSpace(db: Database, showId: string, other: OtherSpace): Promise<ShowSpace> {
  const [show] = await db.select({ unit: shows.linearUnit, upAxis: shows.upAxis }).from(shows).where(eq(shows.id, showId));
  return { metresPerUnit: METRES_PER[show.unit], upAxis: show.upAxis, other };
}
