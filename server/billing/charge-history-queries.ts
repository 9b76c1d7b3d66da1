import { asc, eq, sql } from 'drizzle-orm';
import { alias, type AnyPgColumn } from 'drizzle-orm/pg-core';
import { refundReasons, type ChargeHistory } from '@shared/contracts/billing-contract';
import type { Queryable } from '../database/client';
import { patients, payments, refunds, users } from '../database/schema';

const payer = alias(users, 'payer');
const giver = alias(users, 'giver');

const isPatient = (userId: AnyPgColumn) =>
  sql<boolean>`EXISTS (SELECT FROM ${patients} WHERE ${patients.userId} = ${userId})`;

const personOf = (displayName: string | null, patient: boolean) =>
  displayName === null ? null : { displayName, isPatient: patient };

function reasonOf(text: string) {
  const reason = refundReasons.find((one) => one === text);
  if (!reason) throw new Error(`A refund has the reason ${text}`);
  return reason;
}

type Entry = ChargeHistory['payments'][number];

/** The attempts to pay a charge, oldest first, each with what became of it and what went back. */
export async function paymentsOf(tx: Queryable, chargeId: string): Promise<Entry[]> {
  const rows = await tx
    .select({
      payment: payments,
      refund: refunds,
      payer: payer.displayName,
      payerIsPatient: isPatient(payer.id),
      giver: giver.displayName,
      giverIsPatient: isPatient(giver.id),
    })
    .from(payments)
    .leftJoin(payer, eq(payer.id, payments.createdBy))
    .leftJoin(refunds, eq(refunds.paymentId, payments.id))
    .leftJoin(giver, eq(giver.id, refunds.createdBy))
    .where(eq(payments.chargeId, chargeId))
    .orderBy(asc(payments.createdAt), asc(payments.id));
  return rows.map(({ payment, refund, ...names }) => ({
    id: payment.id,
    amountMinor: payment.amountMinor,
    currency: payment.currency,
    status: payment.status,
    by: personOf(names.payer, names.payerIsPatient),
    at: payment.createdAt.toISOString(),
    settledAt: payment.settledAt?.toISOString() ?? null,
    refund: refund && {
      status: refund.status,
      reason: reasonOf(refund.reason),
      by: personOf(names.giver, names.giverIsPatient),
      at: refund.createdAt.toISOString(),
      settledAt: refund.settledAt?.toISOString() ?? null,
    },
  }));
}
