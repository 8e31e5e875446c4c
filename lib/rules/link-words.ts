/** What a page says about a link that no longer leads anywhere. */
export const LINK_WORDS = {
  invite: {
    refused: 'This invitation was used already, or it has run out. Ask for a new one.',
    used: 'This invitation was used already. Sign in with the password that was chosen then.',
    expired: 'This invitation has run out. Ask whoever invited you to send another one.',
    unknown: 'No invitation has this address. Copy the whole link from the message, or ask for a new one.',
  },
  reset: {
    refused: 'This link was used already, or it has run out. Ask for a new one.',
    used: 'This link was used already. Sign in with the new password, or ask for another link.',
    expired: 'This link has run out: it is good for two hours, and only the newest one works. Ask for another.',
    unknown: 'No password reset has this address. Copy the whole link from the message, or ask for a new one.',
  },
} as const;
