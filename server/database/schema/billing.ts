import { sql } from 'drizzle-orm';
import {
  bigint,
  check,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { appointments } from './booking';
import { id, instant, madeAt } from './columns';
import { patients } from './patients';
import { priceItems } from './program';

/** Money is an integer of minor units beside its ISO 4217 code, never a fraction. */
const minor = () => bigint({ mode: 'number' });

export const chargeStatus = pgEnum('charge_status', ['open', 'paid', 'void', 'refunded']);

export const charges = pgTable(
  'charges',
  {
    id: id(),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    appointmentId: uuid().references(() => appointments.id),
    priceItemId: uuid()
      .notNull()
      .references(() => priceItems.id),
    amountMinor: minor().notNull(),
    currency: text().notNull(),
    status: chargeStatus().notNull().default('open'),
    version: integer().notNull().default(1),
    createdAt: madeAt(),
  },
  (t) => [
    uniqueIndex('charges_appointment_live')
      .on(t.appointmentId)
      .where(sql`status <> 'void'`),
    index('charges_patient').on(t.patientId, t.createdAt),
    check('charges_amount', sql`${t.amountMinor} > 0`),
    check('charges_currency', sql`${t.currency} ~ '^[A-Z]{3}$'`),
  ],
);

export const paymentStatus = pgEnum('payment_status', [
  'preparing',
  'pending',
  'settled',
  'failed',
  'expired',
]);

/** One attempt to pay a charge; its id is the idempotency key sent to the payment service. */
export const payments = pgTable(
  'payments',
  {
    id: id(),
    chargeId: uuid()
      .notNull()
      .references(() => charges.id),
    amountMinor: minor().notNull(),
    currency: text().notNull(),
    status: paymentStatus().notNull().default('preparing'),
    serviceSessionId: text().unique(),
    serviceSessionUrl: text(),
    servicePaymentId: text(),
    createdBy: uuid()
      .notNull()
      .references(() => users.id),
    createdAt: madeAt(),
    settledAt: instant(),
  },
  (t) => [
    uniqueIndex('payments_one_live_attempt')
      .on(t.chargeId)
      .where(sql`status in ('preparing', 'pending')`),
    uniqueIndex('payments_one_settled')
      .on(t.chargeId)
      .where(sql`status = 'settled'`),
    check('payments_amount', sql`${t.amountMinor} > 0`),
  ],
);

export const refundStatus = pgEnum('refund_status', ['pending', 'settled', 'failed']);

export const refunds = pgTable(
  'refunds',
  {
    id: id(),
    paymentId: uuid()
      .notNull()
      .references(() => payments.id)
      .unique(),
    amountMinor: minor().notNull(),
    currency: text().notNull(),
    status: refundStatus().notNull().default('pending'),
    reason: text().notNull(),
    serviceRefundId: text().unique(),
    createdBy: uuid().references(() => users.id),
    createdAt: madeAt(),
    settledAt: instant(),
  },
  (t) => [check('refunds_amount', sql`${t.amountMinor} > 0`)],
);

/** What the payment service told us, once each; append-only. */
export const paymentEvents = pgTable('payment_events', {
  id: text().primaryKey(),
  type: text().notNull(),
  objectId: text(),
  payload: jsonb().$type<unknown>().notNull(),
  receivedAt: madeAt(),
});

export const ledgerAccount = pgEnum('ledger_account', ['receivable', 'income', 'cash', 'refunds']);

/** Double entry, append-only: the entries of one journal balance at commit. */
export const ledgerEntries = pgTable(
  'ledger_entries',
  {
    id: id(),
    journalId: uuid().notNull(),
    /** What the journal tells of, e.g. `charge:<id>`; makes each posting happen once. */
    postingKey: text().notNull(),
    account: ledgerAccount().notNull(),
    debitMinor: minor().notNull().default(0),
    creditMinor: minor().notNull().default(0),
    currency: text().notNull(),
    chargeId: uuid().references(() => charges.id),
    at: madeAt(),
  },
  (t) => [
    unique('ledger_entries_posting').on(t.postingKey, t.account),
    index('ledger_entries_journal').on(t.journalId),
    index('ledger_entries_charge').on(t.chargeId),
    check(
      'ledger_entries_one_side',
      sql`(${t.debitMinor} > 0 and ${t.creditMinor} = 0) or (${t.creditMinor} > 0 and ${t.debitMinor} = 0)`,
    ),
  ],
);
