import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  date,
  index,
  integer,
  pgEnum,
  pgTable,
  text,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { id, instant, instantRange, madeAt } from './columns';
import { enrollments, patients } from './patients';
import { classDates } from './program';

/** FHIR R4 appointment status. */
export const appointmentStatus = pgEnum('appointment_status', [
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
]);

/** The statuses that hold a place; the constraints of the migration name the same. */
const holdsPlace = sql`status in ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow')`;

/**
 * A patient's place in a class date. An exclusion constraint (written in a migration) keeps one
 * patient out of two overlapping classes; a trigger keeps the counters of the class date, the course and the day.
 */
export const appointments = pgTable(
  'appointments',
  {
    id: id(),
    classDateId: uuid()
      .notNull()
      .references(() => classDates.id),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    enrollmentId: uuid()
      .notNull()
      .references(() => enrollments.id),
    status: appointmentStatus().notNull().default('booked'),
    monitored: boolean().notNull(),
    /** Signed without exercise (held at the door) when false; such a visit is no session. */
    exercised: boolean().notNull().default(true),
    localDate: date({ mode: 'string' }).notNull(),
    startsAt: instant().notNull(),
    endsAt: instant().notNull(),
    during: instantRange()
      .notNull()
      .generatedAlwaysAs(sql`tstzrange(starts_at, ends_at)`),
    version: integer().notNull().default(1),
    createdAt: madeAt(),
    createdBy: uuid()
      .notNull()
      .references(() => users.id),
    arrivedAt: instant(),
    checkedInAt: instant(),
    cancelledAt: instant(),
    cancelledBy: uuid().references(() => users.id),
    cancelledReason: text(),
  },
  (t) => [
    uniqueIndex('appointments_once').on(t.classDateId, t.patientId).where(holdsPlace),
    index('appointments_class_date').on(t.classDateId),
    index('appointments_patient').on(t.patientId, t.startsAt),
    index('appointments_enrollment_attended')
      .on(t.enrollmentId, t.localDate)
      .where(sql`status = 'fulfilled'`),
    check('appointments_order', sql`${t.endsAt} > ${t.startsAt}`),
  ],
);
