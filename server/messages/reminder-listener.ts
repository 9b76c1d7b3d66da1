import { eq } from 'drizzle-orm';
import { reminderDueAt } from '@shared/scheduling/reminder-time';
import type { Transaction } from '../database/client';
import { patients } from '../database/schema';
import type { AppointmentFacts, AppointmentListener } from '../schedule/appointment-events';
import { enqueueMessage, withdrawMessage } from './messages-service';

const keyOf = (appointmentId: string): string => `reminder:${appointmentId}`;

async function ownZone(tx: Transaction, patientId: string): Promise<string | null> {
  const [row] = await tx
    .select({ timeZone: patients.timeZone })
    .from(patients)
    .where(eq(patients.id, patientId));
  return row?.timeZone ?? null;
}

async function remind(
  tx: Transaction,
  { appointmentId, patientId, startsAt }: AppointmentFacts,
  zone: string,
  at: Date,
): Promise<void> {
  const dueAt = reminderDueAt(startsAt, zone);
  // Booked after that moment, the confirmation reminds.
  if (dueAt <= at) return;
  const about = { kind: 'reminder', dedupeKey: keyOf(appointmentId) } as const;
  await enqueueMessage(tx, { ...about, patientId, subject: { appointmentId }, dueAt });
}

/** Writes the reminder of each place with the booking, and takes it back with the place. */
export const remindOfAppointments: AppointmentListener = async (tx, event, { at }) => {
  if (event.type === 'cancelled') {
    return withdrawMessage(tx, keyOf(event.appointment.appointmentId));
  }
  const zone = await ownZone(tx, event.appointments[0].patientId);
  for (const appointment of event.appointments) {
    await remind(tx, appointment, zone ?? appointment.timeZone, at);
  }
};
