import { sql } from 'drizzle-orm';
import type { Transaction } from '@/db/client';
import { users } from '@/db/schema/users';
import { StudioError } from '@/lib/rules/studio-error';
import { nameFromEmail } from './name-from-email';

type User = typeof users.$inferSelect;

/** The user of an address, made now where nobody has it; a disabled one is refused. The user's row stays locked. */
export async function findOrMakeUser(tx: Transaction, email: string, name: string | undefined): Promise<{ user: User; isNew: boolean }> {
  const [made] = await tx
    .insert(users)
    .values({ email, name: name ?? nameFromEmail(email) })
    .onConflictDoNothing()
    .returning();
  if (made) return { user: made, isNew: true };
  const [user] = await tx.select().from(users).where(sql`lower(${users.email}) = ${email}`).for('share');
  if (user.disabledAt) throw new StudioError('conflict', `${user.name} may not sign in any more. Ask an admin.`, { field: 'email' });
  return { user, isNew: false };
}
