import { and, eq, gt, isNull, sql } from 'drizzle-orm';
import { oneTimeLinks } from '@/db/schema/one-time-links';
import { users } from '@/db/schema/users';
import { issueLink } from '@/lib/auth/issue-link';
import type { Context } from '@/lib/context';
import { queueMail } from '@/lib/mail/queue-mail';
import { invitationMail } from '@/lib/mail/templates/invitation';
import { passwordResetMail } from '@/lib/mail/templates/password-reset';
import type { RequestResetInput } from '@/lib/rules/inputs/request-reset';

const LINKS_PER_HOUR = 5;

/**
 * Mails a link to choose a new password, or the invitation again to whoever never followed it. The answer is the same for
 * an address that nobody has, for a disabled user, and past five links within an hour: it never tells who has an account.
 */
export async function requestReset(context: Context, input: RequestResetInput): Promise<{ sent: true }> {
  await context.db.transaction(async (tx) => {
    const [user] = await tx
      .select()
      .from(users)
      .where(and(sql`lower(${users.email}) = ${input.email}`, isNull(users.disabledAt)))
      .for('update');
    if (!user) return;
    const recent = await tx.$count(oneTimeLinks, and(eq(oneTimeLinks.userId, user.id), gt(oneTimeLinks.createdAt, sql`now() - interval '1 hour'`)));
    if (recent >= LINKS_PER_HOUR) return;
    if (user.passwordHash === null) {
      const link = await issueLink(tx, user.id, 'invite');
      await queueMail(tx, user.email, invitationMail({ name: user.name, invitedBy: 'The studio', show: null, ...link }));
    } else {
      const link = await issueLink(tx, user.id, 'reset');
      await queueMail(tx, user.email, passwordResetMail({ name: user.name, ...link }));
    }
  });
  return { sent: true };
}
