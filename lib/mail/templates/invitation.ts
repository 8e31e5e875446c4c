import { composeMessage, type Message } from '../message';

/** Invites a person to choose a password; names the show and the role where they were invited into one. */
export function invitationMail(facts: { name: string; invitedBy: string; show: { title: string; role: string } | null; url: string; hours: number }): Message {
  const into = facts.show ? `${facts.show.title} as ${facts.show.role}` : 'Weighhouse';
  return composeMessage(
    facts.show ? `Invitation to ${facts.show.title}` : 'Invitation to Weighhouse',
    [`Hello ${facts.name},`, `${facts.invitedBy} invites you to ${into}. Choose a password to begin.`],
    { label: 'Accept the invitation', url: facts.url },
    [`The link works once and for ${Math.round(facts.hours / 24)} days. If you did not expect it, leave it alone and nothing happens.`],
  );
}
