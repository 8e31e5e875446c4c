import { eq } from 'drizzle-orm';
import { users } from '@/db/schema/users';
import { requireActor } from '@/lib/auth/require-actor';
import type { Context } from '@/lib/context';
import type { MailChoice } from '@/lib/rules/mail-choices';
import { StudioError } from '@/lib/rules/studio-error';

/** How the caller wants to be told. */
export async function getMailChoice(context: Context): Promise<MailChoice> {
  const { db, actor } = requireActor(context);
  const [user] = await db.select({ choice: users.mailChoice }).from(users).where(eq(users.id, actor.userId));
  if (!user) throw new StudioError('not_found', 'There is no such user.');
  return user.choice;
}
