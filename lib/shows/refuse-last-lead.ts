import { and, eq, isNull, ne, sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { members } from '@/db/schema/members';
import { shows } from '@/db/schema/shows';
import { users } from '@/db/schema/users';
import { StudioError } from '@/lib/rules/studio-error';

/** Locks a show's row, so that one change of its members waits for another. */
export async function lockShow(tx: Transaction, showId: string): Promise<void> {
  await tx.select({ id: shows.id }).from(shows).where(eq(shows.id, showId)).for('update');
}

/** Refuses to take a show's last lead away. The caller holds lockShow. */
export async function refuseLastLead(tx: Transaction, show: { id: string; code: string }, userId: string): Promise<void> {
  const others = await tx
    .select({ id: members.userId })
    .from(members)
    .innerJoin(users, eq(users.id, members.userId))
    .where(and(eq(members.showId, show.id), eq(members.role, 'lead'), isNull(users.disabledAt), ne(users.id, userId)))
    .limit(1);
  if (others.length === 0) throw new StudioError('conflict', `This is the last lead of ${show.code}. Make somebody else lead first.`);
}

/** The shows at work that this user leads alone; their rows stay locked until the transaction ends. */
export async function showsLedAlone(tx: Transaction, userId: string): Promise<string[]> {
  const led = await tx
    .select({ id: shows.id, code: shows.code })
    .from(shows)
    .innerJoin(members, and(eq(members.showId, shows.id), eq(members.userId, userId), eq(members.role, 'lead')))
    .where(isNull(shows.archivedAt))
    .orderBy(shows.id)
    .for('update', { of: shows });
  if (led.length === 0) return [];
  const alone = await tx.execute<{ show_id: string }>(sql`
    select m.show_id from members m join users u on u.id = m.user_id
    where m.role = 'lead' and u.disabled_at is null
      and m.show_id in (select show_id from members where user_id = ${userId} and role = 'lead')
    group by m.show_id having count(*) filter (where m.user_id <> ${userId}) = 0`);
  const ids = new Set(alone.rows.map((row) => row.show_id));
  return led.filter((show) => ids.has(show.id)).map((show) => show.code);
}
