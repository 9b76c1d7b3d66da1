import { PassThrough } from 'node:stream';
import nodemailer, { type MailMessage, type SMTPPoolOptions } from 'nodemailer';
import addressparser from 'nodemailer/lib/addressparser';
import { isLoopback } from '../environment';
import { checkMail } from './mail-check';
import type { Mailer, MailOutcome, OutgoingMail } from './mailer';
import { outcomeOfFailure } from './smtp-failure';

export interface SmtpConfig {
  /** `smtp://` or `smtps://`, with user and password in it where the server asks for them. */
  url: string;
  /** The sender, such as `Harbor Lane <no-reply@harborlane.example>`; the name tells no kind of care. */
  from: string;
}

const second = 1000;
const idHeader = 'X-Plimsoll-Message';

/** Mail through one SMTP server, over a few connections that are kept open. */
export function createMailer(config: SmtpConfig): Mailer {
  const from = senderOf(config.from);
  const domain = from.address.slice(from.address.lastIndexOf('@') + 1);
  const transport = nodemailer.createTransport(transportOptions(config.url));
  const handedOver = new Set<string>();
  transport.use('stream', (message, done) => {
    noteEnd(message, (id) => handedOver.add(id));
    done();
  });

  const deliver = async (mail: OutgoingMail, messageId: string): Promise<MailOutcome> => {
    try {
      await transport.sendMail({
        from,
        to: { name: '', address: mail.to },
        subject: mail.subject,
        text: mail.text,
        html: mail.html,
        messageId,
        headers: { ...mail.headers, [idHeader]: mail.outboxId },
        disableFileAccess: true,
        disableUrlAccess: true,
      });
      return { outcome: 'sent', messageId };
    } catch (error) {
      return outcomeOfFailure(error, messageId, handedOver.has(messageId));
    } finally {
      handedOver.delete(messageId);
    }
  };

  return {
    senderName: from.name || from.address,
    send(mail) {
      const fault = checkMail(mail);
      if (fault) return Promise.resolve({ outcome: 'permanent', ...fault });
      return deliver(mail, `<${mail.outboxId}@${domain}>`);
    },
    close() {
      transport.close();
    },
  };
}

/**
 * How the server is reached. Beyond loopback the link is encrypted and the certificate checked, or
 * nothing is sent.
 */
export function transportOptions(address: string): SMTPPoolOptions & { pool: true } {
  const url = new URL(address);
  const secure = url.protocol === 'smtps:';
  return {
    pool: true,
    maxConnections: 4,
    // A message of which nobody knows whether it arrived is for the outbox to repeat, not the pool.
    maxRequeues: 0,
    host: url.hostname.replace(/^\[(.*)\]$/, '$1'),
    port: Number(url.port || (secure ? 465 : 587)),
    secure,
    requireTLS: !secure && !isLoopback(url.hostname),
    connectionTimeout: 10 * second,
    greetingTimeout: 10 * second,
    socketTimeout: 20 * second,
    ...(url.username === ''
      ? {}
      : {
          auth: { user: decodeURIComponent(url.username), pass: decodeURIComponent(url.password) },
        }),
  };
}

function senderOf(text: string): { name: string; address: string } {
  const [sender] = addressparser(text, { flatten: true });
  if (!sender?.address) throw new Error(`Not a sender's address: ${text}`);
  return { name: sender.name, address: sender.address };
}

/** Notes when a message's last byte has gone to the socket: only from then on may the server have it. */
function noteEnd(message: MailMessage, note: (messageId: string) => void): void {
  const id = message.message.messageId();
  message.message.transform(
    () =>
      new PassThrough({
        flush(done) {
          note(id);
          done();
        },
      }),
  );
}
