import { and, eq, inArray, ne, notExists, sql } from 'drizzle-orm';
import type { Transaction } from '../database/client';
import { appointments, charges, payments, refunds } from '../database/schema';

export type ChargeRow = typeof charges.$inferSelect;
export type PaymentRow = typeof payments.$inferSelect;

/** Every change of a charge, its attempts and its refunds starts with this lock. */
export async function lockCharge(tx: Transaction, id: string): Promise<ChargeRow | undefined> {
  const [row] = await tx.select().from(charges).where(eq(charges.id, id)).for('no key update');
  return row;
}

/** The charge of an appointment that is not void, locked. */
export async function lockChargeOf(
  tx: Transaction,
  appointmentId: string,
): Promise<ChargeRow | undefined> {
  const [row] = await tx
    .select()
    .from(charges)
    .where(and(eq(charges.appointmentId, appointmentId), ne(charges.status, 'void')))
    .for('no key update');
  return row;
}

/** A charge that stayed when the patient cancelled a place in this class late, locked. */
export async function lockStandingCharge(
  tx: Transaction,
  { patientId, classDateId }: { readonly patientId: string; readonly classDateId: string },
): Promise<ChargeRow | undefined> {
  const given = tx
    .select({ id: refunds.id })
    .from(refunds)
    .innerJoin(payments, eq(payments.id, refunds.paymentId))
    .where(eq(payments.chargeId, charges.id));
  const cancelled = tx
    .select({ id: appointments.id })
    .from(appointments)
    .where(
      and(
        eq(appointments.patientId, patientId),
        eq(appointments.classDateId, classDateId),
        eq(appointments.status, 'cancelled'),
      ),
    );
  const [row] = await tx
    .select()
    .from(charges)
    .where(
      and(
        inArray(charges.appointmentId, cancelled),
        inArray(charges.status, ['open', 'paid']),
        notExists(given),
      ),
    )
    .for('no key update');
  return row;
}

/** Lets a charge stand for another place in the same class. */
export async function moveCharge(
  tx: Transaction,
  id: string,
  appointmentId: string,
): Promise<void> {
  await tx
    .update(charges)
    .set({ appointmentId, version: sql`${charges.version} + 1` })
    .where(eq(charges.id, id));
}

export async function insertCharge(
  tx: Transaction,
  charge: typeof charges.$inferInsert,
): Promise<ChargeRow> {
  const [row] = await tx.insert(charges).values(charge).returning();
  if (!row) throw new Error('The charge was not inserted');
  return row;
}

export async function setChargeStatus(
  tx: Transaction,
  id: string,
  status: ChargeRow['status'],
): Promise<void> {
  await tx
    .update(charges)
    .set({ status, version: sql`${charges.version} + 1` })
    .where(eq(charges.id, id));
}

/** The one attempt to pay a charge that is not decided yet. */
export async function liveAttempt(
  tx: Transaction,
  chargeId: string,
): Promise<PaymentRow | undefined> {
  const [row] = await tx
    .select()
    .from(payments)
    .where(
      and(eq(payments.chargeId, chargeId), inArray(payments.status, ['preparing', 'pending'])),
    );
  return row;
}

export async function settledPayment(
  tx: Transaction,
  chargeId: string,
): Promise<PaymentRow | undefined> {
  const [row] = await tx
    .select()
    .from(payments)
    .where(and(eq(payments.chargeId, chargeId), eq(payments.status, 'settled')));
  return row;
}

/** @returns undefined for an id that is none of ours */
export async function findPayment(tx: Transaction, id: string): Promise<PaymentRow | undefined> {
  const [row] = await tx.select().from(payments).where(eq(payments.id, id));
  return row;
}

export async function insertAttempt(
  tx: Transaction,
  charge: ChargeRow,
  made: { readonly createdBy: string; readonly createdAt: Date },
): Promise<PaymentRow> {
  const { id: chargeId, amountMinor, currency } = charge;
  const [row] = await tx
    .insert(payments)
    .values({ chargeId, amountMinor, currency, ...made })
    .returning();
  if (!row) throw new Error('The attempt was not inserted');
  return row;
}

export async function updatePayment(
  tx: Transaction,
  id: string,
  change: Partial<typeof payments.$inferInsert>,
): Promise<void> {
  await tx.update(payments).set(change).where(eq(payments.id, id));
}

/** Changes an attempt that is still under way; what was decided meanwhile stays. */
export async function updateUndecided(
  tx: Transaction,
  id: string,
  change: Partial<typeof payments.$inferInsert>,
): Promise<void> {
  await tx
    .update(payments)
    .set(change)
    .where(and(eq(payments.id, id), inArray(payments.status, ['preparing', 'pending'])));
}

/** @returns the refund's id; undefined when this payment is given back already */
export async function insertRefund(
  tx: Transaction,
  refund: typeof refunds.$inferInsert,
): Promise<string | undefined> {
  const [row] = await tx
    .insert(refunds)
    .values(refund)
    .onConflictDoNothing({ target: refunds.paymentId })
    .returning({ id: refunds.id });
  return row?.id;
}
