import { asc, eq, sql } from 'drizzle-orm';
import { auditEvents } from '@/db/schema/audit-events';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import { getShowAccess } from '@/lib/shows/get-show-access';

/** The acts and the people that a show's history knows, to choose from. */
export async function listEventFilters(context: Context, show: string): Promise<{ acts: string[]; people: { name: string; email: string }[] }> {
  const { actor, db } = requireActor(context);
  const access = await getShowAccess(db, actor, show, 'readHistory');
  const acts = await db.selectDistinct({ act: auditEvents.act }).from(auditEvents).where(eq(auditEvents.showId, access.show.id)).orderBy(asc(auditEvents.act));
  const people = await db
    .selectDistinct({ name: users.name, email: users.email, order: sql`lower(${users.name})` })
    .from(auditEvents)
    .innerJoin(users, eq(users.id, auditEvents.actorId))
    .where(eq(auditEvents.showId, access.show.id))
    .orderBy(asc(sql`lower(${users.name})`));
  return { acts: acts.map((row) => row.act), people: people.map(({ name, email }) => ({ name, email })) };
}
