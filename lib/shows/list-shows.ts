import { and, asc, eq, gt, inArray, isNotNull, sql } from 'drizzle-orm';
import type { Database } from '@/db/client';
import { members } from '@/db/schema/members';
import { partCurrent } from '@/db/schema/part-current';
import { shows } from '@/db/schema/shows';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { ListShowsInput } from '@/lib/rules/inputs/list-shows';
import { may, type ActingRole } from '@/lib/rules/roles';
import { VALUE_STATES, type ValueState } from '@/lib/rules/states';
import { showAnswer } from './show-answer';

export interface ListedShow extends ReturnType<typeof showAnswer> {
  role: ActingRole;
  /** Parts by state; null for a guest, who may not see them. */
  parts: Record<ValueState, number> | null;
}

/** The shows that the caller is in (an admin: all), by code, with what waits for somebody in each. */
export async function listShows(context: Context, input: ListShowsInput): Promise<{ items: ListedShow[]; next_cursor: string | null }> {
  const { actor, db } = requireActor(context);
  const code = sql`lower(${shows.code})`;
  const found = await db
    .select({ show: shows, role: members.role })
    .from(shows)
    .leftJoin(members, and(eq(members.showId, shows.id), eq(members.userId, actor.userId)))
    .where(and(actor.isAdmin ? undefined : isNotNull(members.userId), input.cursor ? gt(code, input.cursor.toLowerCase()) : undefined))
    .orderBy(asc(code))
    .limit(input.limit + 1);
  const rows = found.slice(0, input.limit);
  const counts = await countParts(db, rows.map((row) => row.show.id));
  const items = rows.map(({ show, role: held }) => {
    const role: ActingRole = actor.isAdmin ? 'admin' : held!;
    return { ...showAnswer(show), role, parts: may(role, 'readShow') ? counts(show.id) : null };
  });
  return { items, next_cursor: found.length > input.limit ? items[items.length - 1].code : null };
}

async function countParts(db: Database, showIds: string[]): Promise<(showId: string) => Record<ValueState, number>> {
  const counted = showIds.length
    ? await db
        .select({ showId: partCurrent.showId, state: partCurrent.state, parts: sql<number>`count(*)::int` })
        .from(partCurrent)
        .where(inArray(partCurrent.showId, showIds))
        .groupBy(partCurrent.showId, partCurrent.state)
    : [];
  return (showId) => {
    const none = Object.fromEntries(VALUE_STATES.map((state) => [state, 0])) as Record<ValueState, number>;
    for (const row of counted) if (row.showId === showId) none[row.state] = row.parts;
    return none;
  };
}
