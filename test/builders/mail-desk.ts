import { startMailCatcher, type MailCatcher } from '../../server/fakes/mail/catcher';
import type { ReadMessage } from '../../server/fakes/mail/read-message';
import type { Mailer } from '../../server/mail/mailer';
import { createMailer } from '../../server/mail/smtp-mailer';

/** A mail server that delivers nothing, and the mailer that speaks with it. */
export interface MailDesk {
  readonly catcher: MailCatcher;
  readonly mailer: Mailer;
  /** What an SMTP_URL would be. */
  readonly url: string;
  /** What was caught, oldest first. */
  readonly caught: (to?: string) => Promise<ReadMessage[]>;
  /** A message as it came over the wire. */
  readonly raw: (id: string) => Promise<string>;
  readonly faults: (fault: object, times?: number) => Promise<void>;
  readonly reset: () => Promise<void>;
  readonly close: () => Promise<void>;
}

export async function openMailDesk(): Promise<MailDesk> {
  const catcher = await startMailCatcher({ port: 0, smtpPort: 0, folder: null });
  const url = `smtp://127.0.0.1:${catcher.smtpPort}`;
  const mailer = createMailer({ url, from: 'Harbor Lane <no-reply@harborlane.example>' });
  const read = async <T>(path: string): Promise<T> =>
    (await (await fetch(`${catcher.url}${path}`)).json()) as T;
  const post = async (path: string, body?: object): Promise<void> => {
    const headers = { 'content-type': 'application/json' };
    const reply = await fetch(`${catcher.url}${path}`, {
      method: 'POST',
      ...(body && { headers, body: JSON.stringify(body) }),
    });
    if (!reply.ok) throw new Error(await reply.text());
  };
  return {
    catcher,
    mailer,
    url,
    caught: async (to) => {
      const query = to === undefined ? '' : `?to=${encodeURIComponent(to)}`;
      return (await read<{ items: ReadMessage[] }>(`/api/messages${query}`)).items.reverse();
    },
    raw: async (id) => (await read<{ raw: string }>(`/api/messages/${id}`)).raw,
    faults: (fault, times = 1) => post('/_control', { faults: [{ fault, times }] }),
    reset: () => post('/_reset'),
    close: async () => {
      mailer.close();
      await catcher.stop();
    },
  };
}
