import { enqueueMessage } from '../messages/messages-service';
import type { AppointmentListener } from './appointment-events';

/** Confirms what was booked, a series in one message, and tells of each place given back. */
export const messageOfAppointments: AppointmentListener = async (tx, event, { at }) => {
  if (event.type === 'booked') {
    const [first] = event.appointments;
    const ids = event.appointments.map(({ appointmentId }) => appointmentId);
    await enqueueMessage(tx, {
      kind: 'booking-confirmation',
      dedupeKey: `booking-confirmation:${first.appointmentId}`,
      patientId: first.patientId,
      subject: { appointmentIds: ids.join(' ') },
      dueAt: at,
    });
    return;
  }
  const { appointmentId, patientId } = event.appointment;
  await enqueueMessage(tx, {
    kind: 'booking-cancellation',
    dedupeKey: `booking-cancellation:${appointmentId}`,
    patientId,
    subject: { appointmentIds: appointmentId },
    dueAt: at,
  });
};
