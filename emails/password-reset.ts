import { webAddress } from './clean-text';
import { defineTemplate, type Letter } from './template';
import { timeInWords } from './when';

export interface PasswordResetProps extends Letter {
  /** Where the new password is set, with the token in the fragment. */
  link: string;
  /** Instant in ISO 8601. */
  expiresAt: string;
  timeZone: string;
}

/** Lets a user who forgot the password set a new one. */
export const passwordReset = defineTemplate<PasswordResetProps>({
  subject: 'Set a new password',
  heading: 'Set a new password',
  blocks: [
    {
      kind: 'paragraph',
      text: 'Someone asked to set a new password for your account. If it was you, go on here.',
    },
    { kind: 'button', label: 'Set a new password', address: 'link' },
    { kind: 'paragraph', text: 'The link works once, until {{until}}.' },
    {
      kind: 'paragraph',
      text: 'If it was not you, do nothing. Your password stays as it is.',
    },
  ],
  view: ({ link, expiresAt, timeZone }) => ({
    link: webAddress(link),
    until: timeInWords(expiresAt, timeZone),
  }),
});
