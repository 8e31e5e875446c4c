import { and, isNotNull, sql } from 'drizzle-orm';
import { users } from '@/db/schema/users';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { EnableUserInput } from '@/lib/rules/inputs/enable-user';
import { StudioError } from '@/lib/rules/studio-error';

/** Lets a disabled person sign in again, with the password, tokens and roles they had. */
export async function enableUser(context: Context, input: EnableUserInput): Promise<{ email: string; disabled: false }> {
  const known = requireAdmin(context, 'editUsers');
  return known.db.transaction(async (tx) => {
    const [user] = await tx
      .update(users)
      .set({ disabledAt: null })
      .where(and(sql`lower(${users.email}) = ${input.email}`, isNotNull(users.disabledAt)))
      .returning();
    if (!user) throw new StudioError('conflict', `${input.email} is not disabled.`, { field: 'email' });
    await recordEvent(tx, known, { showId: null, act: 'enable-user', subject: user.email, items: [{ field: 'disabled', before: 'true', after: 'false' }] });
    return { email: user.email, disabled: false as const };
  });
}
