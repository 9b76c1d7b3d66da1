import type { MessageKind, MessagePreferences } from '@shared/contracts/messages-contract';
import type { Transaction } from '../database/client';
import { hashOfToken, newToken } from '../http/secret-token';

/** What may be declined: receipts, changes of places and account mail go out in any case. */
const declinable: readonly string[] = ['reminder'] satisfies MessageKind[];

export async function readPreferences(
  tx: Transaction,
  patientId: string,
): Promise<MessagePreferences> {
  const { rows } = await tx.connection.query<MessagePreferences>(
    'SELECT reminders FROM message_preferences WHERE patient_id = $1',
    [patientId],
  );
  return rows[0] ?? { reminders: true };
}

export async function setPreferences(
  tx: Transaction,
  patientId: string,
  { reminders }: MessagePreferences,
  now: Date,
): Promise<void> {
  await tx.connection.query(
    `INSERT INTO message_preferences (patient_id, reminders, changed_at) VALUES ($1, $2, $3)
     ON CONFLICT (patient_id) DO UPDATE SET reminders = excluded.reminders, changed_at = excluded.changed_at`,
    [patientId, reminders, now],
  );
}

/** Whether the patient has asked not to be sent this kind of message. */
export async function isDeclined(
  tx: Transaction,
  { kind, patientId }: { readonly kind: string; readonly patientId: string | null },
): Promise<boolean> {
  if (patientId === null || !declinable.includes(kind)) return false;
  return !(await readPreferences(tx, patientId)).reminders;
}

const pathOf = (token: string): string => `/unsubscribe/${token}`;

/** Where the page asks whether to stop reminders. */
export const unsubscribePage = (origin: string, token: string): string =>
  `${origin}${pathOf(token)}`;

/** A mail's own two ways to stop reminders. */
export interface Unsubscribing {
  /** The page that asks. */
  readonly link: string;
  /** What a mail program stops them by, at a press of its own button: RFC 2369, RFC 8058 section 3.1. */
  readonly headers: Readonly<Record<string, string>>;
}

/** Makes a secret for one mail, to be sent at once. */
export async function issueUnsubscribing(
  tx: Transaction,
  asked: { readonly patientId: string; readonly origin: string; readonly now: Date },
): Promise<Unsubscribing> {
  const { patientId, origin, now } = asked;
  const token = newToken();
  await tx.connection.query(
    'INSERT INTO unsubscribe_links (token_hash, patient_id, created_at) VALUES ($1, $2, $3)',
    [hashOfToken(token), patientId, now],
  );
  return {
    link: unsubscribePage(origin, token),
    headers: {
      'List-Unsubscribe': `<${origin}/api${pathOf(token)}>`,
      'List-Unsubscribe-Post': 'List-Unsubscribe=One-Click',
    },
  };
}

/** @returns undefined when no mail of ours held this secret, or it was forgotten since */
export async function patientOfUnsubscribing(
  tx: Transaction,
  token: string,
): Promise<string | undefined> {
  const { rows } = await tx.connection.query<{ patientId: string }>(
    'SELECT patient_id AS "patientId" FROM unsubscribe_links WHERE token_hash = $1',
    [hashOfToken(token)],
  );
  return rows[0]?.patientId;
}

/** Common practice, from memory: links in mail should work for a good while; nobody answers a mail of a year ago. */
const KEPT_MS = 365 * 24 * 3_600_000;

export async function forgetOldLinks(tx: Transaction, now: Date): Promise<void> {
  await tx.connection.query('DELETE FROM unsubscribe_links WHERE created_at < $1', [
    new Date(now.getTime() - KEPT_MS),
  ]);
}
