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
import type { TestProtocol } from '@shared/clinical/exercise-test/protocols';
import type { StandEnding } from '@shared/clinical/five-times-sit-to-stand';
import type { EcgHindrance } from '@shared/clinical/thresholds/ecg-readable';
import type { RecordValues } from '@shared/contracts/record-contract';
import { id } from './columns';
import { attribution, ending, ofPatient } from './record-entry';

type TestValues = RecordValues<'exercise-tests'>;

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
    protocolKind: text().$type<TestProtocol>().notNull().default('other'),
    performedOn: date({ mode: 'string' }).notNull(),
    endedBy: testEnd().notNull(),
    restingHeartRate: real(),
    peakHeartRate: real().notNull(),
    peakSystolic: real(),
    peakDiastolic: real(),
    peakExertion: real(),
    exerciseMinutes: real(),
    stages: jsonb().$type<TestValues['stages']>().notNull().default([]),
    gait: text().$type<TestValues['gait']>(),
    handrail: boolean(),
    effort: text().$type<TestValues['effort']>(),
    recoveryOne: real(),
    recoveryTwo: real(),
    recoveryPosture: text().$type<TestValues['recoveryPosture']>(),
    signs: jsonb().$type<TestValues['signs']>().notNull().default([]),
    /** Null: not asked. */
    drugsTaken: jsonb().$type<TestValues['drugsTaken']>(),
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
    check(
      'exercise_tests_pressure',
      sql`${t.peakDiastolic} is null or (${t.peakSystolic} is not null and ${t.peakDiastolic} < ${t.peakSystolic})`,
    ),
    check(
      'exercise_tests_bounds',
      sql`${t.peakSystolic} between 50 and 300 and ${t.peakDiastolic} between 20 and 200 and ${t.peakExertion} between 6 and 20 and ${t.exerciseMinutes} between 0.1 and 60 and ${t.recoveryOne} between 30 and 230 and ${t.recoveryTwo} between 30 and 230`,
    ),
    check(
      'exercise_tests_lists',
      sql`jsonb_typeof(${t.stages}) = 'array' and jsonb_typeof(${t.signs}) = 'array' and coalesce(jsonb_typeof(${t.drugsTaken}), 'array') in ('array', 'null')`,
    ),
    check(
      'exercise_tests_treadmill',
      sql`${t.mode} = 'treadmill' or (${t.gait} is null and ${t.handrail} is null)`,
    ),
    check(
      'exercise_tests_words',
      sql`${t.gait} in ('walk', 'run') and ${t.effort} in ('maximal', 'submaximal') and ${t.recoveryPosture} in ('upright', 'seated', 'supine')`,
    ),
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
    ...ending(),
    /** The later clean test that a person took for its end. */
    supersededByTestId: uuid().references(() => exerciseTests.id),
    ...attribution(),
  },
  (t) => [
    index('thresholds_patient').on(t.patientId, t.status),
    check(
      'thresholds_superseded_by_test',
      sql`${t.supersededByTestId} is null or ${t.status} = 'superseded'`,
    ),
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

/** Whether the ECG can show ischemia in exercise: what hides it; none listed, it can. */
export const restingEcgs = pgTable(
  'resting_ecgs',
  {
    id: id(),
    patientId: ofPatient(),
    hindrances: text().array().$type<EcgHindrance[]>().notNull(),
    observedOn: date({ mode: 'string' }).notNull(),
    note: text(),
    ...attribution(),
  },
  (t) => [index('resting_ecgs_patient').on(t.patientId, t.observedOn)],
);

export const chairStands = pgTable(
  'chair_stands',
  {
    id: id(),
    patientId: ofPatient(),
    /** Null: could not be done. */
    seconds: real(),
    ending: text().$type<StandEnding>().notNull(),
    performedOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('chair_stands_patient').on(t.patientId, t.performedOn),
    check('chair_stands_seconds', sql`${t.seconds} between 3 and 300`),
    check('chair_stands_ending', sql`${t.ending} in ('standing-fifth-time', 'seated-fifth-time')`),
  ],
);
