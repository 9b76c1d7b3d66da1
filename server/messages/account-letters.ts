import { invitation } from '../../emails/invitation';
import { passwordReset } from '../../emails/password-reset';
import type { LinkRecipient } from '../accounts/link-recipient-queries';
import { issueLink } from '../accounts/tokens-service';
import { zoneForUser } from './letters-queries';
import type { Writing, Written } from './letters';

type AccountLetter = (writing: Writing, user: LinkRecipient) => Promise<Written>;

/** The link is made here, since only its hash is kept; a repeat carries a new one. */
async function linkProps(
  { tx, now, origin, senderName }: Writing,
  user: LinkRecipient,
  purpose: 'invitation' | 'password-reset',
) {
  const { link, expiresAt } = await issueLink(tx, { purpose, userId: user.id, origin, now });
  return {
    firstName: user.firstName,
    sender: { name: senderName, phone: null },
    link,
    expiresAt: expiresAt.toISOString(),
    timeZone: await zoneForUser(tx, user.id),
  };
}

const HOUR = 3_600_000;
/** An answer to a question that is this old is no help any more, and its link would only puzzle. */
const RESET_WAITS_MS = HOUR;

const inviting: AccountLetter = async (writing, user) => {
  if (user.hasPassword) return { outcome: 'overtaken' };
  const props = await linkProps(writing, user, 'invitation');
  return { outcome: 'letter', render: () => invitation.render(props) };
};

const resetting: AccountLetter = async (writing, user) => {
  const waited = writing.now.getTime() - writing.message.dueAt.getTime();
  if (waited > RESET_WAITS_MS) return { outcome: 'overtaken' };
  const props = await linkProps(writing, user, 'password-reset');
  return { outcome: 'letter', render: () => passwordReset.render(props) };
};

/** What people are told of their accounts, by kind. */
export const accountLetters: Readonly<Record<string, AccountLetter>> = {
  invitation: inviting,
  'password-reset': resetting,
};
