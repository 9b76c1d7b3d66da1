import PostalMime, { type Address } from 'postal-mime';
import type { Caught } from './message-folder';

export interface ReadMessage {
  id: string;
  receivedAt: string;
  envelope: { from: string; recipients: string[] };
  messageId: string | null;
  subject: string;
  from: string;
  to: string[];
  text: string;
  html: string | null;
  headers: { name: string; value: string }[];
}

/** Reads a message's MIME parts. */
export async function readMessage(caught: Caught): Promise<ReadMessage> {
  const email = await PostalMime.parse(Buffer.from(caught.raw, 'latin1'));
  return {
    id: caught.id,
    receivedAt: caught.receivedAt,
    envelope: { from: caught.from, recipients: caught.recipients },
    messageId: email.messageId ?? null,
    subject: email.subject ?? '',
    from: email.from ? written(email.from) : '',
    to: (email.to ?? []).map(written),
    text: email.text ?? '',
    html: email.html ?? null,
    headers: email.headers.map(({ key, value }) => ({ name: key, value })),
  };
}

function written({ name, address, group }: Address): string {
  if (group) return `${name}: ${group.map(written).join(', ')}`;
  return name ? `${name} <${address ?? ''}>` : (address ?? '');
}
