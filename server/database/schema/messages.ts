import {
  boolean,
  customType,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  text,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { id, instant, madeAt } from './columns';
import { patients } from './patients';

const bytes = customType<{ data: Buffer }>({ dataType: () => 'bytea' });

export const outboxStatus = pgEnum('outbox_status', [
  'pending',
  'sending',
  'sent',
  'uncertain',
  'cancelled',
  'failed',
]);

/** What is to be told to whom, written in the transaction that it tells of; facts are read again at sending. */
export const outbox = pgTable(
  'outbox',
  {
    id: id(),
    kind: text().notNull(),
    dedupeKey: text().notNull(),
    patientId: uuid().references(() => patients.id),
    userId: uuid().references(() => users.id),
    /** Ids of what the message is about, never the text of it. */
    subject: jsonb().$type<Record<string, string>>().notNull(),
    dueAt: instant().notNull(),
    status: outboxStatus().notNull().default('pending'),
    attempts: integer().notNull().default(0),
    /** Not tried before: the end of a worker's hold on it, or of the wait after a failed try. */
    holdUntil: instant(),
    lastError: text(),
    sentAt: instant(),
    createdAt: madeAt(),
  },
  (t) => [
    uniqueIndex('outbox_dedupe_unique').on(t.dedupeKey),
    index('outbox_due').on(t.status, t.dueAt),
  ],
);

/** Addresses that refused mail for good; nothing more is sent to them. */
export const suppressions = pgTable('suppressions', {
  address: text().primaryKey(),
  reason: text().notNull(),
  createdAt: madeAt(),
});

/** What a patient wants to be sent. No row is the default: reminders come. */
export const messagePreferences = pgTable('message_preferences', {
  patientId: uuid()
    .primaryKey()
    .references(() => patients.id),
  reminders: boolean().notNull(),
  changedAt: madeAt(),
});

/** Where reminders are stopped without signing in: a secret a mail, kept as a hash. */
export const unsubscribeLinks = pgTable(
  'unsubscribe_links',
  {
    tokenHash: bytes().primaryKey(),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    createdAt: madeAt(),
  },
  (t) => [index('unsubscribe_links_age').on(t.createdAt)],
);

/** Where a patient's own calendar program reads; one address a patient, kept as a hash. */
export const calendarLinks = pgTable('calendar_links', {
  patientId: uuid()
    .primaryKey()
    .references(() => patients.id),
  tokenHash: bytes().notNull().unique(),
  createdAt: madeAt(),
});
