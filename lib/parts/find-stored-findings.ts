import { asc, eq } from 'drizzle-orm';
import { z } from 'zod';
import type { Executor } from '@/db/client';
import { findings } from '@/db/schema/findings';
import type { DetailFinding, FindingPlace } from '@/lib/rules/part-detail';

const three = z.tuple([z.number(), z.number(), z.number()]);

const placesShape: z.ZodType<FindingPlace[]> = z.array(
  z.object({
    face: z.number().nullable(),
    edge: z.tuple([z.number(), z.number()]).nullable(),
    vertex: z.number().nullable(),
    position: three.nullable().catch(null),
    line: z.number().nullable(),
  }),
);

export type StoredFinding = DetailFinding & { part: string | null };

/** All findings of a geometry record with their places, in the engine's order. */
export async function findStoredFindings(db: Executor, recordId: string): Promise<StoredFinding[]> {
  const rows = await db.select().from(findings).where(eq(findings.recordId, recordId)).orderBy(asc(findings.ordinal));
  return rows.map(({ code, severity, message, part, count, places }) => ({ code, severity, message, part, count, places: placesShape.parse(places) }));
}
