import * as z from 'zod';
import type { OutgoingMail } from './mailer';

export interface MailFault {
  reason: 'invalid-address' | 'invalid-message';
  detail: string;
}

const address = z.email().max(254);
// Control characters and the two line separators: what could end a header line somewhere.
const lineBreaking = /[\p{Cc}\p{Zl}\p{Zp}]/u;
const headerName = /^[A-Za-z0-9-]{1,76}$/;
const opaqueId = /^[A-Za-z0-9-]{1,64}$/;

/**
 * The last guard before SMTP: one address and no value that could begin another header line.
 * Templates make such values harmless before; what still has one is refused, not mended.
 */
export function checkMail(mail: OutgoingMail): MailFault | null {
  if (!address.safeParse(mail.to).success) {
    return { reason: 'invalid-address', detail: 'The address is not one e-mail address.' };
  }
  const faulty = [
    opaqueId.test(mail.outboxId) ? null : 'the id',
    lineBreaking.test(mail.subject) ? 'the subject' : null,
    ...Object.entries(mail.headers ?? {}).map(([name, value]) =>
      headerName.test(name) && !lineBreaking.test(value) ? null : 'a header field',
    ),
  ].find((part) => part !== null);
  return faulty
    ? { reason: 'invalid-message', detail: `There is a character in ${faulty} that must not be.` }
    : null;
}
