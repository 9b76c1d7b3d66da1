import * as z from 'zod';
import { bookingConflicts } from '../scheduling/booking-conflict';
import { daysBetween } from '../scheduling/wall-time';
import { cursorField, localDateField as localDate, textField } from './fields';

export const appointmentStatuses = [
  'proposed',
  'pending',
  'booked',
  'arrived',
  'checked-in',
  'fulfilled',
  'cancelled',
  'noshow',
  'waitlist',
  'entered-in-error',
] as const;

export const appointmentStatusSchema = z.enum(appointmentStatuses);
export type AppointmentStatus = z.infer<typeof appointmentStatusSchema>;

export const classKindSchema = z.enum(['exercise', 'orientation', 'education']);
export type ClassKind = z.infer<typeof classKindSchema>;

const instant = z.iso.datetime({ offset: true });
const localTime = z.string().regex(/^([01]\d|2[0-3]):[0-5]\d$/, 'Enter a time as HH:MM');
const version = z.int().min(1);

/** What a patient pays for a class themselves. */
export const priceSchema = z.object({
  name: z.string(),
  amountMinor: z.int().positive(),
  currency: z.string().length(3),
});
export type Price = z.infer<typeof priceSchema>;

/** The longest span of class dates that one call lists, in days. */
export const CLASS_DATES_SPAN_DAYS = 92;

/** `GET /api/class-dates`: local dates of the site, `from` inclusive, `to` exclusive. */
export const classDatesQuerySchema = z
  .strictObject({ siteId: z.uuid(), from: localDate, to: localDate })
  .refine(({ from, to }) => from < to, { path: ['to'], message: 'Choose a later end' })
  .refine(({ from, to }) => daysBetween(from, to) <= CLASS_DATES_SPAN_DAYS, {
    path: ['to'],
    message: `At most ${CLASS_DATES_SPAN_DAYS} days at once`,
  });
export type ClassDatesQuery = z.infer<typeof classDatesQuerySchema>;

export const classDateSchema = z.object({
  id: z.uuid(),
  siteId: z.uuid(),
  name: z.string(),
  kind: classKindSchema,
  startsAt: instant,
  endsAt: instant,
  localDate: z.iso.date(),
  /** What the wall clock at the site shows at the start, HH:MM. */
  localStart: z.string(),
  capacity: z.int(),
  booked: z.int(),
  monitoredCapacity: z.int(),
  monitoredBooked: z.int(),
  status: z.enum(['scheduled', 'closed', 'cancelled']),
  /** Set for a class that patients pay themselves. */
  price: priceSchema.nullable(),
});
export type ClassDate = z.infer<typeof classDateSchema>;

export const classDatesResponseSchema = z.object({
  items: z.array(classDateSchema),
  nextCursor: z.null(),
});

/** `POST /api/appointments`; a patient books for themselves and leaves `patientId` out. */
export const bookRequestSchema = z.strictObject({
  classDateId: z.uuid(),
  patientId: z.uuid().optional(),
});
export type BookRequest = z.infer<typeof bookRequestSchema>;

export const appointmentSchema = z.object({
  id: z.uuid(),
  classDateId: z.uuid(),
  patientId: z.uuid(),
  status: appointmentStatusSchema,
  startsAt: instant,
  endsAt: instant,
  version,
});
export type Appointment = z.infer<typeof appointmentSchema>;

/** `PATCH /api/appointments/:id`; see `server/schedule/schedule-policy.ts` for who may do what. */
export const changeAppointmentRequestSchema = z.strictObject({
  status: appointmentStatusSchema,
  reason: textField(200, 'Enter a reason').optional(),
  /** False cancels only while that is in time: who was told that it is free is never charged by a clock that went on. */
  acceptsLate: z.boolean().optional(),
  version,
});
export type ChangeAppointmentRequest = z.infer<typeof changeAppointmentRequestSchema>;

/** An appointment as lists show it: with its class and site. */
export const appointmentItemSchema = appointmentSchema.extend({
  className: z.string(),
  kind: classKindSchema,
  localDate: z.iso.date(),
  monitored: z.boolean(),
  price: priceSchema.nullable(),
  /** What the patient owes for this place, or has paid and does not get back; null when nothing. */
  charge: z
    .object({ amountMinor: z.int().positive(), currency: z.string().length(3), paid: z.boolean() })
    .nullable(),
  cancelledReason: z.string().nullable(),
  site: z.object({ id: z.uuid(), name: z.string(), timeZone: z.string(), phone: z.string() }),
});
export type AppointmentItem = z.infer<typeof appointmentItemSchema>;

/** `GET /api/appointments`: a patient's own; staff name the patient. Local dates, `to` exclusive. */
export const appointmentsQuerySchema = z.strictObject({
  patientId: z.uuid().optional(),
  from: localDate.optional(),
  to: localDate.optional(),
  order: z.enum(['earliest-first', 'latest-first']).default('earliest-first'),
  cursor: cursorField.optional(),
  limit: z.coerce.number().int().min(1).max(100).default(25),
});
export type AppointmentsQuery = z.infer<typeof appointmentsQuerySchema>;

export const appointmentsResponseSchema = z.object({
  items: z.array(appointmentItemSchema),
  nextCursor: z.string().nullable(),
});

/** `GET /api/class-dates/:id/appointments`: who is in the class, who was and cancelled. */
export const classAppointmentSchema = appointmentSchema.extend({
  displayName: z.string(),
  recordNumber: z.string(),
  monitored: z.boolean(),
  cancelledReason: z.string().nullable(),
});
export type ClassAppointment = z.infer<typeof classAppointmentSchema>;

export const classAppointmentsResponseSchema = z.object({ items: z.array(classAppointmentSchema) });

/** `POST /api/appointments/series/preview` */
export const seriesPreviewRequestSchema = z.strictObject({
  patientId: z.uuid(),
  siteId: z.uuid(),
  weekdays: z
    .array(z.int().min(1).max(7))
    .min(1, 'Choose at least one day of the week')
    .max(7)
    .refine((days) => new Set(days).size === days.length, 'Name each day once'),
  startTime: localTime,
  from: localDate,
  count: z.int().min(1).max(72),
});
export type SeriesPreviewRequest = z.infer<typeof seriesPreviewRequestSchema>;

export const plannedDateSchema = z.object({
  classDateId: z.uuid().nullable(),
  localDate: z.iso.date(),
  startsAt: instant,
  conflict: z.enum(bookingConflicts).nullable(),
  alternatives: z.array(z.object({ classDateId: z.uuid(), startsAt: instant })),
});
export type PlannedDate = z.infer<typeof plannedDateSchema>;

export const seriesPreviewResponseSchema = z.object({ items: z.array(plannedDateSchema) });

/** `POST /api/appointments/series`: all or nothing. */
export const bookSeriesRequestSchema = z.strictObject({
  patientId: z.uuid(),
  classDateIds: z
    .array(z.uuid())
    .min(1)
    .max(72)
    .refine((ids) => new Set(ids).size === ids.length, 'Name each class date once'),
});
export type BookSeriesRequest = z.infer<typeof bookSeriesRequestSchema>;

export const bookSeriesResponseSchema = z.object({ items: z.array(appointmentSchema) });
