/** How somebody wants to be told of what happens: each thing at once, once a day, or not at all. */
export const MAIL_CHOICES = ['at_once', 'daily', 'none'] as const;
export type MailChoice = (typeof MAIL_CHOICES)[number];

export const MAIL_CHOICE_WORDS: Record<MailChoice, string> = {
  at_once: 'at once',
  daily: 'once a day',
  none: 'not at all',
};
