import type { Transaction } from '@/db/client';
import { issueLink } from '@/lib/auth/issue-link';
import type { Actor } from '@/lib/context';
import { queueMail } from '@/lib/mail/queue-mail';
import { invitationMail } from '@/lib/mail/templates/invitation';
import { ROLE_NAMES, type Role } from '@/lib/rules/roles';

/** Issues an invitation link in place of earlier ones and queues its message, in the caller's transaction. */
export async function sendInvitation(
  tx: Transaction,
  actor: Actor,
  user: { id: string; email: string; name: string },
  show: { title: string; role: Role } | null,
): Promise<void> {
  const { url, hours } = await issueLink(tx, user.id, 'invite');
  const into = show ? { title: show.title, role: ROLE_NAMES[show.role].toLowerCase().replace('td', 'TD') } : null;
  await queueMail(tx, user.email, invitationMail({ name: user.name, invitedBy: invitedBy(actor), show: into, url, hours }));
}

function invitedBy(actor: Actor): string {
  return actor.via === 'system' ? 'The studio' : actor.name;
}
