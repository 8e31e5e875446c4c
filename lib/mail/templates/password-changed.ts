import { composeMessage, type Message } from '../message';

/** Tells the owner of an account that its password was changed. */
export function passwordChangedMail(facts: { name: string; url: string }): Message {
  return composeMessage(
    'Your password was changed',
    [`Hello ${facts.name},`, 'The password of your Weighhouse account was changed just now, and every session was ended.'],
    { label: 'If it was not you, choose another one here', url: facts.url },
    ['Tokens stay good: look through them on your account page.'],
  );
}
