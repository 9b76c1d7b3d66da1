import { webAddress } from './clean-text';
import { defineTemplate, type Letter } from './template';
import { timeInWords } from './when';

export interface InvitationProps extends Letter {
  /** Where a password is chosen, with the token in the fragment. */
  link: string;
  /** Instant in ISO 8601. */
  expiresAt: string;
  timeZone: string;
}

/** Asks a new user to choose a password. */
export const invitation = defineTemplate<InvitationProps>({
  subject: 'Set up your account',
  heading: 'Set up your account',
  blocks: [
    {
      kind: 'paragraph',
      text: '{{senderName}} has opened an account for you. Choose a password to start using it.',
    },
    { kind: 'button', label: 'Choose a password', address: 'link' },
    { kind: 'paragraph', text: 'The link works once, until {{until}}.' },
    { kind: 'paragraph', text: 'If you did not expect this message, you can leave it alone.' },
  ],
  view: ({ link, expiresAt, timeZone }) => ({
    link: webAddress(link),
    until: timeInWords(expiresAt, timeZone),
  }),
});
