import * as z from 'zod';
import { appointmentStatuses } from './schedule-contract';
import './zod';

// The front desk's first minute of the day.

const instant = z.iso.datetime({ offset: true });
const money = z.object({ chargeId: z.uuid(), amountMinor: z.int(), currency: z.string() });

export const deskArrivalSchema = z.object({
  appointmentId: z.uuid(),
  patientId: z.uuid(),
  displayName: z.string(),
  recordNumber: z.string(),
  phone: z.string().nullable(),
  status: z.enum(appointmentStatuses),
  version: z.int(),
  /** What is open for this class; null when nothing is. */
  due: money.nullable(),
});
export type DeskArrival = z.infer<typeof deskArrivalSchema>;

export const deskClassSchema = z.object({
  id: z.uuid(),
  name: z.string(),
  startsAt: instant,
  endsAt: instant,
  capacity: z.int(),
  booked: z.int(),
  status: z.enum(['scheduled', 'closed', 'cancelled']),
  arrivals: z.array(deskArrivalSchema),
});
export type DeskClass = z.infer<typeof deskClassSchema>;

/** A place in a class to come that was given back since the beginning of yesterday. */
export const freedPlaceSchema = z.object({
  appointmentId: z.uuid(),
  patientId: z.uuid(),
  displayName: z.string(),
  recordNumber: z.string(),
  cancelledAt: instant,
  classDateId: z.uuid(),
  className: z.string(),
  startsAt: instant,
  localDate: z.iso.date(),
  /** Places free in that class now: others may have taken this one. */
  free: z.int(),
});
export type FreedPlace = z.infer<typeof freedPlaceSchema>;

export const deskSiteSchema = z.object({
  id: z.uuid(),
  name: z.string(),
  timeZone: z.string(),
  /** Today at the site. */
  localDate: z.iso.date(),
  classes: z.array(deskClassSchema),
  freed: z.array(freedPlaceSchema),
});
export type DeskSite = z.infer<typeof deskSiteSchema>;

/** `GET /api/desk/today`: the sites of who asks, by name. */
export const deskTodaySchema = z.object({ at: instant, sites: z.array(deskSiteSchema) });
export type DeskToday = z.infer<typeof deskTodaySchema>;
