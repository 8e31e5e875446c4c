import { and, eq, isNull, ne } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { users } from '@/db/schema/users';
import { StudioError } from '@/lib/rules/studio-error';

/** Refuses to take the last admin away: nobody could let anybody in again. The caller holds lockAdmins. */
export async function refuseLastAdmin(tx: Transaction, userId: string): Promise<void> {
  const others = await tx.$count(users, and(eq(users.isAdmin, true), isNull(users.disabledAt), ne(users.id, userId)));
  if (others === 0) throw new StudioError('conflict', 'This is the last admin. Make somebody else an admin first.', { field: 'email' });
}
