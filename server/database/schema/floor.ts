import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  date,
  index,
  integer,
  jsonb,
  pgEnum,
  pgTable,
  primaryKey,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import type { MachineSetting } from '@shared/clinical/progression/machine-setting';
import { users } from './accounts';
import { appointments } from './booking';
import { instant, madeAt } from './columns';
import { patients } from './patients';
import { prescriptions } from './prescriptions';

/** One visit on the floor; the id comes from the client so that a repeated write is the same write. */
export const sessionRecords = pgTable(
  'session_records',
  {
    id: uuid().primaryKey(),
    appointmentId: uuid()
      .notNull()
      .references(() => appointments.id),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    startedAt: instant().notNull(),
    /** The range in force when the record began; null where there was none. */
    prescriptionId: uuid().references(() => prescriptions.id),
    /** Why that range was out of force when the record began: then effort leads, and its ceiling stays. */
    rangeWithdrawn: text().array().notNull().default([]),
    /** What the patient was identified by, by whom and when the record was made; null when the sender did not say. */
    identityConfirmedWith: text().array(),
    receivedAt: madeAt(),
    recordedBy: uuid()
      .notNull()
      .references(() => users.id),
    signedAt: instant(),
    signedBy: uuid().references(() => users.id),
    exercised: boolean(),
  },
  (t) => [
    unique('session_records_appointment').on(t.appointmentId),
    index('session_records_patient').on(t.patientId, t.startedAt),
    check('session_records_signature', sql`(${t.signedAt} is null) = (${t.signedBy} is null)`),
    check(
      'session_records_two_identifiers',
      sql`${t.identityConfirmedWith} is null or (cardinality(${t.identityConfirmedWith}) >= 2 and ${t.identityConfirmedWith} <@ array['name', 'birth-date', 'record-number'])`,
    ),
  ],
);

export const vitalPhase = pgEnum('vital_phase', ['resting', 'exercise', 'recovery']);
export const placement = pgEnum('placement', ['below', 'in', 'above', 'over-ceiling']);
/** FHIR R4 observation status. */
export const observationStatus = pgEnum('observation_status', [
  'preliminary',
  'final',
  'amended',
  'entered-in-error',
]);

/** A reading. A trigger refuses every change of its values: a correction is a new row that amends it. */
export const vitalSigns = pgTable(
  'vital_signs',
  {
    id: uuid().primaryKey(),
    sessionRecordId: uuid()
      .notNull()
      .references(() => sessionRecords.id),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    phase: vitalPhase().notNull(),
    measuredAt: instant().notNull(),
    heartRate: integer(),
    systolic: integer(),
    diastolic: integer(),
    oxygenSaturation: integer(),
    perceivedExertion: integer(),
    symptoms: jsonb().$type<string[]>().notNull().default([]),
    note: text(),
    placement: placement(),
    /** The range that the placement was read against. */
    prescriptionId: uuid().references(() => prescriptions.id),
    status: observationStatus().notNull().default('final'),
    amends: uuid().references((): AnyPgColumn => vitalSigns.id),
    amendmentReason: text(),
    receivedAt: madeAt(),
    recordedBy: uuid()
      .notNull()
      .references(() => users.id),
  },
  (t) => [
    index('vital_signs_record').on(t.sessionRecordId, t.measuredAt),
    index('vital_signs_patient').on(t.patientId, t.measuredAt),
    uniqueIndex('vital_signs_amends_once')
      .on(t.amends)
      .where(sql`amends is not null`),
    check('vital_signs_heart_rate', sql`${t.heartRate} between 20 and 300`),
    check('vital_signs_systolic', sql`${t.systolic} between 40 and 300`),
    check(
      'vital_signs_diastolic',
      sql`${t.diastolic} between 20 and 200 and ${t.diastolic} < ${t.systolic}`,
    ),
    check('vital_signs_oxygen', sql`${t.oxygenSaturation} between 50 and 100`),
    check('vital_signs_exertion', sql`${t.perceivedExertion} between 6 and 20`),
    check(
      'vital_signs_amendment_reason',
      sql`(${t.amends} is null) = (${t.amendmentReason} is null)`,
    ),
  ],
);

/** Work on a machine during a visit, as it was at the end of conditioning. The latest of a record counts; none is ever changed. */
export const exerciseBouts = pgTable(
  'exercise_bouts',
  {
    id: uuid().primaryKey(),
    sessionRecordId: uuid()
      .notNull()
      .references(() => sessionRecords.id),
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    setting: jsonb().$type<MachineSetting>().notNull(),
    /** Conditioning without pauses. */
    minutes: integer(),
    /** Bouts too short for heart rate to follow. */
    shortBouts: boolean().notNull().default(false),
    receivedAt: madeAt(),
    recordedBy: uuid()
      .notNull()
      .references(() => users.id),
  },
  (t) => [
    index('exercise_bouts_record').on(t.sessionRecordId, t.receivedAt),
    check('exercise_bouts_minutes', sql`${t.minutes} between 1 and 180`),
  ],
);

/** Whether a patient came without the day's dose of a rate-acting drug: effort leads that day alone. */
export const missedDoses = pgTable(
  'missed_doses',
  {
    patientId: uuid()
      .notNull()
      .references(() => patients.id),
    localDate: date({ mode: 'string' }).notNull(),
    /** False: it was said by mistake. */
    missed: boolean().notNull(),
    recordedAt: madeAt(),
    recordedBy: uuid()
      .notNull()
      .references(() => users.id),
  },
  (t) => [primaryKey({ name: 'missed_doses_day', columns: [t.patientId, t.localDate] })],
);
