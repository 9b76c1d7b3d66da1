import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  customType,
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
import { id, madeAt, nameText } from './columns';
import { sites } from './program';

const searchVector = customType<{ data: string }>({ dataType: () => 'tsvector' });

export const sexAtBirth = pgEnum('sex_at_birth', ['female', 'male', 'unknown']);

export const patients = pgTable(
  'patients',
  {
    id: id(),
    /** The program's own number for the record, shown to staff. */
    recordNumber: text().notNull().unique(),
    familyName: nameText().notNull(),
    givenName: nameText().notNull(),
    birthDate: date({ mode: 'string' }).notNull(),
    sexAtBirth: sexAtBirth().notNull(),
    /** May be missing or shared; then there is no account. */
    email: text(),
    phone: text(),
    /** IANA zone when it differs from the site's. */
    timeZone: text(),
    /** The site that holds the record; staff of it may open it. */
    siteId: uuid()
      .notNull()
      .references(() => sites.id),
    userId: uuid()
      .unique()
      .references(() => users.id),
    /** Folded beginnings to search by; the functions of the migration say what stands in it. */
    searchTerms: searchVector().generatedAlwaysAs(
      sql`patient_search_terms(family_name, given_name, record_number, birth_date)`,
    ),
    version: integer().notNull().default(1),
    createdAt: madeAt(),
  },
  (t) => [
    index('patients_name').on(t.familyName, t.givenName, t.id),
    index('patients_site_name').on(t.siteId, t.familyName, t.givenName, t.id),
    index('patients_search').using('gin', t.searchTerms),
    check('patients_birth_date', sql`${t.birthDate} > '1900-01-01'`),
  ],
);

export const diagnosisKind = pgEnum('diagnosis_kind', [
  'heart-attack',
  'stent',
  'bypass',
  'valve',
  'transplant',
  'stable-angina',
  'heart-failure',
  'assist-device',
  'other',
]);

export const enrollmentStatus = pgEnum('enrollment_status', [
  'active',
  'on-hold',
  'completed',
  'discontinued',
]);

/** One course: one qualifying event, one enrollment. Counters are kept by a trigger on appointments. */
export const enrollments = pgTable(
  'enrollments',
  {
    id: id(),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    siteId: uuid()
      .notNull()
      .references(() => sites.id),
    phase: integer().notNull().default(2),
    status: enrollmentStatus().notNull().default('active'),
    qualifyingDiagnosis: diagnosisKind().notNull(),
    qualifyingEventOn: date({ mode: 'string' }).notNull(),
    payer: text().notNull(),
    enrolledOn: date({ mode: 'string' }).notNull(),
    closedOn: date({ mode: 'string' }),
    closedReason: text(),
    /** Frozen at the first signed prescription; what completion is measured against. */
    plannedSessions: integer().notNull().default(36),
    /** How many places the course may hold at most. */
    sessionLimit: integer().notNull().default(36),
    dailyLimit: integer().notNull().default(2),
    /** Whether the patient exercises on a monitored place. */
    monitored: boolean().notNull().default(true),
    booked: integer().notNull().default(0),
    attended: integer().notNull().default(0),
    /** Sessions attended within 252 days of the first, day 252 included. */
    attendedInWindow: integer().notNull().default(0),
    firstSessionOn: date({ mode: 'string' }),
    lastSessionOn: date({ mode: 'string' }),
    version: integer().notNull().default(1),
    createdAt: madeAt(),
  },
  (t) => [
    uniqueIndex('enrollments_one_active')
      .on(t.patientId, t.phase)
      .where(sql`status in ('active', 'on-hold')`),
    index('enrollments_patient').on(t.patientId),
    index('enrollments_first_session').on(t.firstSessionOn, t.siteId),
    check('enrollments_planned', sql`${t.plannedSessions} between 1 and 72`),
    check('enrollments_limit', sql`${t.sessionLimit} between 1 and 72`),
    check('enrollments_daily_limit', sql`${t.dailyLimit} between 1 and 2`),
    check('enrollments_course_limit', sql`${t.booked} between 0 and ${t.sessionLimit}`),
    check('enrollments_attended', sql`${t.attendedInWindow} between 0 and ${t.attended}`),
  ],
);

/** How many places a patient holds on one local date; the check is the day's limit. */
export const patientDays = pgTable(
  'patient_days',
  {
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    localDate: date({ mode: 'string' }).notNull(),
    booked: integer().notNull().default(0),
    dailyLimit: integer().notNull(),
  },
  (t) => [
    uniqueIndex('patient_days_unique').on(t.patientId, t.localDate),
    check('patient_days_limit', sql`${t.booked} between 0 and ${t.dailyLimit}`),
  ],
);
