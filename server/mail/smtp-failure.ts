import type { NodemailerError } from 'nodemailer';
import type { MailOutcome } from './mailer';

/**
 * What a failed sending means (RFC 5321 section 4.2.1: 4yz may pass later, 5yz will not).
 * @param handedOver whether the last byte of the message had left before it failed
 */
export function outcomeOfFailure(
  thrown: unknown,
  messageId: string,
  handedOver: boolean,
): Exclude<MailOutcome, { outcome: 'sent' }> {
  const error = thrown as NodemailerError;
  const detail = error.message;
  if (error.responseCode === undefined) {
    return handedOver
      ? { outcome: 'uncertain', messageId, detail }
      : { outcome: 'temporary', detail };
  }
  const reason = permanentReason(error);
  return reason === null
    ? { outcome: 'temporary', detail }
    : { outcome: 'permanent', reason, detail };
}

/**
 * Only what the server says of this recipient or this message is for good. A refused greeting,
 * sign-in or TLS is ours or the server's to mend, and 503 means a session out of step.
 */
function permanentReason({
  responseCode = 0,
  command,
}: NodemailerError): 'recipient-refused' | 'message-refused' | null {
  if (responseCode < 500 || responseCode === 503) return null;
  if (command === 'RCPT TO') return 'recipient-refused';
  return command === 'DATA' ? 'message-refused' : null;
}
