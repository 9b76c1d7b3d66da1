/** A message as Plimsoll hands it over; rendered by `emails/`. */
export interface OutgoingMail {
  /** Id of the outbox row: the Message-ID is made from it, so that a repeat can be told as one. */
  outboxId: string;
  /** One address, without a name. */
  to: string;
  subject: string;
  text: string;
  html: string;
  /** Further header fields, such as List-Unsubscribe. */
  headers?: Readonly<Record<string, string>>;
}

/**
 * What became of a message. SMTP cannot say "I have it" safely: when the link breaks between the
 * end of the message and the answer, the server may have it or not.
 * - `sent`: the server took it.
 * - `temporary`: it has not got it; try again later.
 * - `permanent`: it will not take it, however often it is tried. `recipient-refused` speaks of the
 *   address, the others of the message or of us.
 * - `uncertain`: it may have it; a repeat carries the same Message-ID.
 */
export type MailOutcome =
  | { outcome: 'sent'; messageId: string }
  | { outcome: 'temporary'; detail: string }
  | {
      outcome: 'permanent';
      reason: 'invalid-address' | 'invalid-message' | 'recipient-refused' | 'message-refused';
      detail: string;
    }
  | { outcome: 'uncertain'; messageId: string; detail: string };

/** `detail` is for the log and for staff: it may hold what the mail server said. */
export interface Mailer {
  /** The name that people see as the sender. */
  readonly senderName: string;
  /** Tries once, at most 60 s; never throws for what a mail server or a network does. */
  send(mail: OutgoingMail): Promise<MailOutcome>;
  /** Lets what is under way finish and closes the connections. */
  close(): void;
}
