import { users } from '@/db/schema/users';
import { contextOfUser } from '@/lib/auth/context-of-user';
import { hashPassword } from '@/lib/auth/password';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { CreateFirstAdminInput } from '@/lib/rules/inputs/create-first-admin';
import { StudioError } from '@/lib/rules/studio-error';
import { hasUsers } from './has-users';
import { lockAdmins } from './lock-admins';

/** Makes the first user, an admin, in a studio that has nobody; refused for ever after. Of two at once one wins. */
export async function createFirstAdmin(context: Context, input: CreateFirstAdminInput): Promise<{ email: string }> {
  if (await hasUsers(context.db)) throw refusal();
  const passwordHash = await hashPassword(input.password);
  return context.db.transaction(async (tx) => {
    await lockAdmins(tx);
    if (await hasUsers(tx)) throw refusal();
    const [user] = await tx.insert(users).values({ email: input.email, name: input.name, passwordHash, isAdmin: true }).returning();
    await recordEvent(tx, contextOfUser(context, user), {
      showId: null,
      act: 'create-first-admin',
      subject: user.email,
      items: [{ field: 'admin', before: null, after: 'true' }],
    });
    return { email: user.email };
  });
}

function refusal(): StudioError {
  return new StudioError('conflict', 'This studio has an admin already. Sign in, or ask them for an invitation.');
}
