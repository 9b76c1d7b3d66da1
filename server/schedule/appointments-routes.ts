import * as z from 'zod';
import { timePosition } from '@shared/contracts/fields';
import {
  appointmentSchema,
  appointmentsQuerySchema,
  appointmentsResponseSchema,
  bookRequestSchema,
  changeAppointmentRequestSchema,
  type Appointment,
} from '@shared/contracts/schedule-contract';
import { requirePatientAccess } from '../accounts/access-service';
import { created, ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import type { AppointmentListener } from './appointment-events';
import {
  findAppointmentPatient,
  listPatientAppointments,
  type AppointmentsPosition,
} from './appointments-queries';
import type { BookedRow } from './booking-repository';
import { bookAppointment } from './booking-service';
import { scheduleContext } from './schedule-context';
import { bookingRoles, mayBookFor, rosterRoles } from './schedule-policy';
import { changeStatus } from './transition-service';

export const presentAppointment = (row: BookedRow): Appointment => ({
  id: row.id,
  classDateId: row.classDateId,
  patientId: row.patientId,
  status: row.status,
  startsAt: row.startsAt.toISOString(),
  endsAt: row.endsAt.toISOString(),
  version: row.version,
});

/** Whom a call is about: the patient named, else the caller's own record. */
function patientOf(
  actor: { readonly patientId: string | null },
  named: string | undefined,
): string {
  const patientId = named ?? actor.patientId;
  if (patientId !== null) return patientId;
  const message = 'Choose the patient';
  throw fail('invalid-request', { errors: [{ path: 'patientId', code: 'required', message }] });
}

function positionOf(cursor: string): AppointmentsPosition {
  const [startsAt, id] = decodeCursor(timePosition, cursor);
  return { startsAt: new Date(startsAt), id };
}

const list = route({
  method: 'get',
  path: '/api/appointments',
  summary: 'A patient’s appointments by start; a patient’s own without patientId',
  access: { roles: [...rosterRoles, 'patient'] },
  audit: {
    action: 'appointments.read',
    objectType: 'patient',
    objectId: ({ input, actor }) => input.query.patientId ?? actor?.patientId ?? null,
    patientId: ({ input, actor }) => input.query.patientId ?? actor?.patientId ?? null,
  },
  request: { query: appointmentsQuerySchema },
  response: { 200: appointmentsResponseSchema },
  handler: async ({ actor, tx, input: { query } }) => {
    const patientId = patientOf(actor, query.patientId);
    await requirePatientAccess(tx, actor, patientId);
    const after = query.cursor === undefined ? null : positionOf(query.cursor);
    const found = await listPatientAppointments(tx, patientId, { ...query, after });
    return ok(pageOf(found, query.limit, ({ startsAt, id }) => [startsAt, id]));
  },
});

const book = (listeners: readonly AppointmentListener[]) =>
  route({
    method: 'post',
    path: '/api/appointments',
    summary: 'Books a place in a class date',
    access: { roles: [...bookingRoles, 'patient'] },
    audit: {
      action: 'appointment.booked',
      objectType: 'appointment',
      objectId: ({ result }) => result.body.id,
      patientId: ({ result }) => result.body.patientId,
      details: ({ input }) => ({ classDateId: input.body.classDateId }),
    },
    request: { body: bookRequestSchema },
    response: { 201: appointmentSchema },
    idempotent: true,
    handler: async (call) => {
      const { actor, tx, input } = call;
      const patientId = patientOf(actor, input.body.patientId);
      await requirePatientAccess(tx, actor, patientId);
      if (!mayBookFor(actor, patientId)) return fail('forbidden');
      const wish = { classDateId: input.body.classDateId, patientId };
      const booked = await bookAppointment(tx, scheduleContext(call, listeners), wish);
      return booked instanceof Failure ? booked : created(presentAppointment(booked));
    },
  });

const change = (listeners: readonly AppointmentListener[]) =>
  route({
    method: 'patch',
    path: '/api/appointments/:id',
    summary: 'Moves an appointment to another status, as the table of transitions allows',
    access: { roles: [...bookingRoles, 'patient', 'administrator'] },
    audit: {
      action: 'appointment.changed',
      objectType: 'appointment',
      objectId: ({ result }) => result.body.id,
      patientId: ({ result }) => result.body.patientId,
      details: ({ input }) => ({ status: input.body.status }),
    },
    request: { params: z.object({ id: z.uuid() }), body: changeAppointmentRequestSchema },
    response: { 200: appointmentSchema },
    handler: async (call) => {
      const { actor, tx, input } = call;
      const patientId = await findAppointmentPatient(tx, input.params.id);
      if (patientId === null) return fail('not-found');
      await requirePatientAccess(tx, actor, patientId);
      const context = scheduleContext(call, listeners);
      const changed = await changeStatus(tx, context, input.params.id, input.body);
      return changed instanceof Failure ? changed : ok(presentAppointment(changed));
    },
  });

export const appointmentsRoutes = (
  listeners: readonly AppointmentListener[],
): RouteDefinition[] => [list, book(listeners), change(listeners)];
