import { composeMessage, type Message } from '../message';

/** A link to choose a new password. */
export function passwordResetMail(facts: { name: string; url: string; hours: number }): Message {
  return composeMessage(
    'A new password for Weighhouse',
    [`Hello ${facts.name},`, 'Somebody, probably you, asked for a new password for this address.'],
    { label: 'Choose a new password', url: facts.url },
    [`The link works once and for ${facts.hours} hours. If it was not you, leave it alone: your password stays as it is.`],
  );
}
