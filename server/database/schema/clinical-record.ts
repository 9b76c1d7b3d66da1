import { sql } from 'drizzle-orm';
import {
  boolean,
  check,
  date,
  index,
  jsonb,
  pgEnum,
  pgTable,
  real,
  text,
  uuid,
} from 'drizzle-orm/pg-core';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import { users } from './accounts';
import { id, instant, madeAt } from './columns';
import { diagnosisKind, patients } from './patients';

/** Who wrote an entry of the record and when; an entry is corrected by a later one, never overwritten. */
const attribution = () => ({
  recordedAt: madeAt(),
  recordedBy: uuid()
    .notNull()
    .references(() => users.id),
  enteredInErrorAt: instant(),
  enteredInErrorBy: uuid().references(() => users.id),
});

const ofPatient = () =>
  uuid()
    .notNull()
    .references(() => patients.id);

export const diagnoses = pgTable(
  'diagnoses',
  {
    id: id(),
    patientId: ofPatient(),
    kind: diagnosisKind().notNull(),
    description: text().notNull(),
    onsetOn: date({ mode: 'string' }),
    ...attribution(),
  },
  (t) => [index('diagnoses_patient').on(t.patientId)],
);

/** A yes-or-no or graded condition that the rules of prescribing ask for; the latest entry of a kind counts. */
export const conditions = pgTable(
  'conditions',
  {
    id: id(),
    patientId: ofPatient(),
    /** A key of the evaluate request's `conditions`. */
    kind: text().notNull(),
    value: text().notNull(),
    ...attribution(),
  },
  (t) => [index('conditions_patient').on(t.patientId, t.kind, t.recordedAt)],
);

/** An event, procedure or stay after which a test no longer stands. */
export const clinicalEvents = pgTable(
  'clinical_events',
  {
    id: id(),
    patientId: ofPatient(),
    kind: text().notNull(),
    description: text().notNull(),
    occurredOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [index('clinical_events_patient').on(t.patientId, t.occurredOn)],
);

export const bodyMeasurements = pgTable(
  'body_measurements',
  {
    id: id(),
    patientId: ofPatient(),
    heightCm: real(),
    weightKg: real(),
    measuredOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('body_measurements_patient').on(t.patientId, t.measuredOn),
    check('body_measurements_height', sql`${t.heightCm} between 100 and 250`),
    check('body_measurements_weight', sql`${t.weightKg} between 25 and 350`),
  ],
);

export const rhythm = pgEnum('rhythm', [
  'sinus',
  'sinus-tracked',
  'sensor-paced',
  'fixed-paced',
  'atrial-fibrillation',
  'atrial-flutter',
  'frequent-ectopy',
  'high-grade-block',
]);

export const rhythmRecords = pgTable(
  'rhythm_records',
  {
    id: id(),
    patientId: ofPatient(),
    rhythm: rhythm().notNull(),
    observedOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [index('rhythm_records_patient').on(t.patientId, t.observedOn)],
);

/** Seated (and standing) rate after five minutes at rest. */
export const restingRates = pgTable(
  'resting_rates',
  {
    id: id(),
    patientId: ofPatient(),
    seated: real().notNull(),
    standing: real(),
    measuredOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('resting_rates_patient').on(t.patientId, t.measuredOn),
    check('resting_rates_seated', sql`${t.seated} between 30 and 130`),
    check('resting_rates_standing', sql`${t.standing} between 30 and 160`),
  ],
);

export const rateActingClass = pgEnum('rate_acting_class', [
  'beta-blocker',
  'ivabradine',
  'diltiazem-verapamil',
  'digoxin',
  'amiodarone-sotalol',
  'thyroid-hormone',
  'other',
]);

export const medications = pgTable(
  'medications',
  {
    id: id(),
    patientId: ofPatient(),
    name: text().notNull(),
    /** Null for a drug that does not act on the heart rate. */
    rateActing: rateActingClass(),
    dose: text().notNull(),
    schedule: text().notNull(),
    startedOn: date({ mode: 'string' }).notNull(),
    stoppedOn: date({ mode: 'string' }),
    /** Who wrote down the stop and when, where it was written after the entry. */
    stopRecordedAt: instant(),
    stopRecordedBy: uuid().references(() => users.id),
    /** A change of dose stops one entry and starts the next, which names it. */
    replaces: uuid().references((): AnyPgColumn => medications.id),
    ...attribution(),
  },
  (t) => [
    index('medications_patient').on(t.patientId, t.startedOn),
    check('medications_order', sql`${t.stoppedOn} >= ${t.startedOn}`),
  ],
);

/** The list was gone through with the patient; before the first of these the rate-acting drugs are unknown. */
export const medicationReviews = pgTable(
  'medication_reviews',
  { id: id(), patientId: ofPatient(), ...attribution() },
  (t) => [index('medication_reviews_patient').on(t.patientId, t.recordedAt)],
);

export const icdStatus = pgEnum('icd_status', ['none', 'present', 'unknown']);

/** The devices as last checked; the latest entry counts, and none at all means unknown. */
export const cardiacDevices = pgTable(
  'cardiac_devices',
  {
    id: id(),
    patientId: ofPatient(),
    icdStatus: icdStatus().notNull(),
    icdZones: jsonb()
      .$type<{ rate: number; kind: 'monitor' | 'pacing' | 'shock' }[]>()
      .notNull()
      .default([]),
    pacemaker: boolean().notNull().default(false),
    upperTrackingRate: real(),
    checkedOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('cardiac_devices_patient').on(t.patientId, t.checkedOn),
    check('cardiac_devices_tracking', sql`${t.upperTrackingRate} between 50 and 220`),
    check(
      'cardiac_devices_zones',
      sql`${t.icdStatus} = 'present' or jsonb_array_length(${t.icdZones}) = 0`,
    ),
  ],
);

export const testMode = pgEnum('test_mode', ['treadmill', 'cycle', 'arm']);
export const testEnd = pgEnum('test_end', [
  'fatigue',
  'dyspnea',
  'angina',
  'st-change',
  'arrhythmia',
  'blood-pressure',
  'claudication',
  'orthopedic',
  'protocol-end',
  'target-rate',
  'other',
]);
export const vo2Source = pgEnum('vo2_source', ['measured', 'estimated']);

export const exerciseTests = pgTable(
  'exercise_tests',
  {
    id: id(),
    patientId: ofPatient(),
    mode: testMode().notNull(),
    protocol: text().notNull(),
    performedOn: date({ mode: 'string' }).notNull(),
    endedBy: testEnd().notNull(),
    restingHeartRate: real(),
    peakHeartRate: real().notNull(),
    peakVo2: real(),
    peakMets: real(),
    vo2Source: vo2Source(),
    note: text(),
    ...attribution(),
  },
  (t) => [
    index('exercise_tests_patient').on(t.patientId, t.performedOn),
    check('exercise_tests_resting', sql`${t.restingHeartRate} between 30 and 130`),
    check('exercise_tests_peak', sql`${t.peakHeartRate} between 60 and 230`),
    check('exercise_tests_vo2', sql`${t.peakVo2} between 4 and 80`),
    check('exercise_tests_mets', sql`${t.peakMets} between 1 and 25`),
  ],
);

export const thresholdKind = pgEnum('threshold_kind', [
  'ischemia',
  'angina',
  'arrhythmia',
  'blood-pressure',
  'symptom',
]);
export const thresholdStatus = pgEnum('threshold_status', ['active', 'superseded', 'retired']);

/** The rate at which a sign or symptom began; it binds until superseded or retired by a physician. */
export const thresholds = pgTable(
  'thresholds',
  {
    id: id(),
    patientId: ofPatient(),
    kind: thresholdKind().notNull(),
    heartRate: real().notNull(),
    /** The highest work tolerated before onset, METs. */
    clearMets: real(),
    exerciseTestId: uuid().references(() => exerciseTests.id),
    /** The threshold that this one took the place of. */
    supersedes: uuid().references((): AnyPgColumn => thresholds.id),
    foundOn: date({ mode: 'string' }).notNull(),
    note: text(),
    status: thresholdStatus().notNull().default('active'),
    endedAt: instant(),
    endedBy: uuid().references(() => users.id),
    endedReason: text(),
    ...attribution(),
  },
  (t) => [
    index('thresholds_patient').on(t.patientId, t.status),
    check('thresholds_rate', sql`${t.heartRate} between 40 and 230`),
    check('thresholds_clear_mets', sql`${t.clearMets} between 1 and 25`),
    check(
      'thresholds_ended_by_someone',
      sql`${t.status} = 'active' or (${t.endedAt} is not null and ${t.endedBy} is not null and ${t.endedReason} is not null)`,
    ),
  ],
);

export const walkTests = pgTable(
  'walk_tests',
  {
    id: id(),
    patientId: ofPatient(),
    distanceMeters: real().notNull(),
    performedOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('walk_tests_patient').on(t.patientId, t.performedOn),
    check('walk_tests_distance', sql`${t.distanceMeters} between 10 and 1200`),
  ],
);

export const riskLevel = pgEnum('risk_level', ['low', 'moderate', 'high', 'unknown']);

export const riskStratifications = pgTable(
  'risk_stratifications',
  {
    id: id(),
    patientId: ofPatient(),
    level: riskLevel().notNull(),
    assessedOn: date({ mode: 'string' }).notNull(),
    note: text(),
    ...attribution(),
  },
  (t) => [index('risk_stratifications_patient').on(t.patientId, t.assessedOn)],
);
