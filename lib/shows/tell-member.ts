import type { Transaction } from '@/db/client';
import type { users } from '@/db/schema/users';
import { config } from '@/lib/config';
import type { Actor } from '@/lib/context';
import { queueMail } from '@/lib/mail/queue-mail';
import { memberAddedMail } from '@/lib/mail/templates/member-added';
import { ROLE_NAMES, type Role } from '@/lib/rules/roles';
import { sendInvitation } from '@/lib/users/send-invitation';

/** Mails a new member: an invitation to somebody who has no password yet, a word to everybody else but the actor. */
export async function tellMember(
  tx: Transaction,
  actor: Actor,
  user: typeof users.$inferSelect,
  show: { code: string; title: string },
  role: Role,
): Promise<'invited' | 'told' | 'not_told'> {
  if (user.passwordHash === null) {
    await sendInvitation(tx, actor, user, { title: show.title, role });
    return 'invited';
  }
  if (user.id === actor.userId) return 'not_told';
  const addedBy = actor.via === 'system' ? 'The studio' : actor.name;
  const url = new URL(`/shows/${encodeURIComponent(show.code)}`, config().baseUrl).href;
  await queueMail(tx, user.email, memberAddedMail({ name: user.name, addedBy, show, role: ROLE_NAMES[role], url }));
  return 'told';
}
