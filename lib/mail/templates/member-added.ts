import { composeMessage, type Message } from '../message';

/** Tells somebody who has an account that they are in a show now. */
export function memberAddedMail(facts: { name: string; addedBy: string; show: { code: string; title: string }; role: string; url: string }): Message {
  return composeMessage(
    `You are in ${facts.show.title}`,
    [`Hello ${facts.name},`, `${facts.addedBy} added you to ${facts.show.title} (${facts.show.code}) as ${facts.role}.`],
    { label: 'Open the show', url: facts.url },
    [],
  );
}
