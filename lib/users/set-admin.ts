import { and, eq, ne, sql } from 'drizzle-orm';
import { users } from '@/db/schema/users';
import { requireAdmin } from '@/lib/auth/require-admin';
import type { Context } from '@/lib/context';
import { recordEvent } from '@/lib/history/record-event';
import type { SetAdminInput } from '@/lib/rules/inputs/set-admin';
import { StudioError } from '@/lib/rules/studio-error';
import { lockAdmins } from './lock-admins';
import { refuseLastAdmin } from './refuse-last-admin';

/** Makes a person an admin of the studio, or no longer one. Refused for the last admin. */
export async function setAdmin(context: Context, input: SetAdminInput): Promise<{ email: string; admin: boolean }> {
  const known = requireAdmin(context, 'editUsers');
  return known.db.transaction(async (tx) => {
    await lockAdmins(tx);
    const [user] = await tx.select().from(users).where(sql`lower(${users.email}) = ${input.email}`);
    if (!user) throw new StudioError('not_found', `Nobody has the address ${input.email}.`, { field: 'email' });
    if (input.admin && user.disabledAt) throw new StudioError('conflict', `${user.name} may not sign in. Let them in again first.`, { field: 'email' });
    if (user.isAdmin && !input.admin) await refuseLastAdmin(tx, user.id);
    const changed = await tx
      .update(users)
      .set({ isAdmin: input.admin })
      .where(and(eq(users.id, user.id), ne(users.isAdmin, input.admin)))
      .returning({ id: users.id });
    if (changed.length > 0) {
      await recordEvent(tx, known, {
        showId: null,
        act: 'set-admin',
        subject: user.email,
        items: [{ field: 'admin', before: String(!input.admin), after: String(input.admin) }],
      });
    }
    return { email: user.email, admin: input.admin };
  });
}
