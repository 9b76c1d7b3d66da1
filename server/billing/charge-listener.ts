import type { Transaction } from '../database/client';
import { addJob } from '../jobs/job';
import type {
  AppointmentCause,
  AppointmentFacts,
  AppointmentListener,
} from '../schedule/appointment-events';
import {
  insertCharge,
  liveAttempt,
  lockChargeOf,
  lockStandingCharge,
  moveCharge,
  setChargeStatus,
  settledPayment,
  type ChargeRow,
} from './charges-repository';
import { post } from './ledger-repository';
import { requestRefund } from './refunds-service';

async function charge(
  tx: Transaction,
  { appointmentId, classDateId, patientId, price }: AppointmentFacts,
  { at }: AppointmentCause,
): Promise<void> {
  if (price === null) return;
  const standing = await lockStandingCharge(tx, { patientId, classDateId });
  if (standing) return moveCharge(tx, standing.id, appointmentId);
  const { priceItemId, amountMinor, currency } = price;
  const made = { patientId, appointmentId, priceItemId, amountMinor, currency, createdAt: at };
  const { id: chargeId } = await insertCharge(tx, made);
  const sides = { debit: 'receivable', credit: 'income' } as const;
  await post(tx, { key: `charge:${chargeId}`, chargeId, ...sides, amountMinor, currency, at });
}

/** Takes an unpaid charge back, and closes a pay page that stands open. */
async function takeBack(tx: Transaction, row: ChargeRow, { at }: AppointmentCause): Promise<void> {
  const { id: chargeId, amountMinor, currency } = row;
  await setChargeStatus(tx, chargeId, 'void');
  const sides = { debit: 'income', credit: 'receivable' } as const;
  await post(tx, { key: `void:${chargeId}`, chargeId, ...sides, amountMinor, currency, at });
  const attempt = await liveAttempt(tx, chargeId);
  if (attempt) await addJob(tx, 'close-attempt', { paymentId: attempt.id });
}

async function giveBack(tx: Transaction, row: ChargeRow, cause: AppointmentCause): Promise<void> {
  if (row.status === 'open') return takeBack(tx, row, cause);
  const payment = row.status === 'paid' ? await settledPayment(tx, row.id) : undefined;
  if (!payment) return;
  return requestRefund(tx, payment, { reason: 'cancelled', createdBy: cause.actorId });
}

/**
 * A self-pay class is charged when it is booked. Cancelled in time, or by the program, the charge is taken back or the
 * payment returned in full; cancelled late it stays, and whoever takes a place in the same class again is not charged twice.
 */
export const chargeForPlaces: AppointmentListener = async (tx, event, cause) => {
  if (event.type === 'booked') {
    for (const appointment of event.appointments) await charge(tx, appointment, cause);
    return;
  }
  if (event.late && !event.byProgram) return;
  const row = await lockChargeOf(tx, event.appointment.appointmentId);
  if (row) await giveBack(tx, row, cause);
};
