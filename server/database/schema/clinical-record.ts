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
import type { DosingTime, DrugFlag } from '@shared/clinical/drugs/drug';
import type { TestProtocol } from '@shared/clinical/exercise-test/protocols';
import type { StandEnding } from '@shared/clinical/five-times-sit-to-stand';
import type { RiskFinding } from '@shared/clinical/risk/criteria';
import type { RestrictionKind } from '@shared/clinical/training/restrictions';
import type { EcgHindrance } from '@shared/clinical/thresholds/ecg-readable';
import type { QuestionnaireKey } from '@shared/contracts/record-assessments-contract';
import type { RecordValues } from '@shared/contracts/record-contract';
import type { PacingMode } from '@shared/contracts/record-treatment-contract';
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

type TestValues = RecordValues<'exercise-tests'>;
type QuestionnaireValues = RecordValues<'questionnaires'>;

/** An end has its instant, its person and its reason, or nothing. */
const endedWhole = (t: Record<'endedAt' | 'endedBy' | 'endedReason', AnyPgColumn>) =>
  sql`num_nulls(${t.endedAt}, ${t.endedBy}, ${t.endedReason}) in (0, 3)`;

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
    since: date({ mode: 'string' }),
    evidence: text(),
    ...attribution(),
  },
  (t) => [
    index('conditions_patient').on(t.patientId, t.kind, t.recordedAt),
    check(
      'conditions_recovered_by_evidence',
      sql`${t.kind} <> 'transplant' or ${t.value} <> 'recovered' or ${t.evidence} is not null`,
    ),
  ],
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
    salt: text(),
    flags: text().array().$type<DrugFlag[]>().notNull().default([]),
    times: text().array().$type<DosingTime[]>().notNull().default([]),
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
    check(
      'medications_flags',
      sql`${t.flags} <@ array['anticoagulant', 'nitrate', 'glucose-lowering']`,
    ),
    check(
      'medications_times',
      sql`${t.times} <@ array['morning', 'noon', 'evening', 'bedtime', 'as-needed']`,
    ),
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
    pacingMode: text().$type<PacingMode>(),
    lowerRate: real(),
    upperTrackingRate: real(),
    upperSensorRate: real(),
    checkedOn: date({ mode: 'string' }).notNull(),
    ...attribution(),
  },
  (t) => [
    index('cardiac_devices_patient').on(t.patientId, t.checkedOn),
    check('cardiac_devices_tracking', sql`${t.upperTrackingRate} between 50 and 220`),
    check('cardiac_devices_lower', sql`${t.lowerRate} between 30 and 150`),
    check('cardiac_devices_sensor', sql`${t.upperSensorRate} between 50 and 220`),
    check(
      'cardiac_devices_order',
      sql`${t.lowerRate} is null or (${t.lowerRate} < coalesce(${t.upperTrackingRate}, 999) and ${t.lowerRate} < coalesce(${t.upperSensorRate}, 999))`,
    ),
    check(
      'cardiac_devices_paces',
      sql`${t.pacemaker} or (${t.pacingMode} is null and ${t.lowerRate} is null and ${t.upperSensorRate} is null)`,
    ),
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
    endedAt: instant(),
    endedBy: uuid().references(() => users.id),
    endedReason: text(),
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

export const riskLevel = pgEnum('risk_level', ['low', 'moderate', 'high', 'unknown']);

export const riskStratifications = pgTable(
  'risk_stratifications',
  {
    id: id(),
    patientId: ofPatient(),
    level: riskLevel().notNull(),
    /** Each criterion there, not there or missing (null). */
    findings: jsonb().$type<Partial<Record<RiskFinding, boolean | null>>>().notNull().default({}),
    ejectionFraction: real(),
    capacity: real(),
    overrideReason: text(),
    assessedOn: date({ mode: 'string' }).notNull(),
    note: text(),
    ...attribution(),
  },
  (t) => [
    index('risk_stratifications_patient').on(t.patientId, t.assessedOn),
    check('risk_stratifications_ejection', sql`${t.ejectionFraction} between 5 and 90`),
    check('risk_stratifications_capacity', sql`${t.capacity} between 1 and 25`),
    // What is missing never counts as low, nor does a person's word make it so.
    check(
      'risk_stratifications_low_is_whole',
      sql`${t.level} <> 'low' or (jsonb_array_length(jsonb_path_query_array(${t.findings}, '$.* ? (@ != null)')) = 14 and ${t.ejectionFraction} is not null and ${t.capacity} is not null)`,
    ),
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

/** Ordered for one patient; lifted by a person, or over after its last day. */
export const restrictions = pgTable(
  'restrictions',
  {
    id: id(),
    patientId: ofPatient(),
    kind: text().$type<RestrictionKind>().notNull(),
    limit: real(),
    diastolic: real(),
    detail: text().notNull(),
    orderedBy: text().notNull(),
    orderedOn: date({ mode: 'string' }).notNull(),
    until: date({ mode: 'string' }),
    endedAt: instant(),
    endedBy: uuid().references(() => users.id),
    endedReason: text(),
    ...attribution(),
  },
  (t) => [
    index('restrictions_patient').on(t.patientId, t.orderedOn),
    check(
      'restrictions_kind',
      sql`${t.kind} in ('sternum', 'device-arm', 'joint', 'fall', 'lifting', 'oxygen', 'pressure', 'claudication')`,
    ),
    check('restrictions_order', sql`${t.until} >= ${t.orderedOn}`),
    check(
      'restrictions_limit',
      sql`(${t.kind} in ('lifting', 'oxygen', 'pressure')) = (${t.limit} is not null)`,
    ),
    check(
      'restrictions_pressure',
      sql`${t.diastolic} is null or (${t.kind} = 'pressure' and ${t.diastolic} < ${t.limit})`,
    ),
    check('restrictions_lifted_by_someone', endedWhole(t)),
  ],
);

/** Answers as given; scores are computed from them. A PHQ-9 whose ninth item is above zero waits for a person. */
export const questionnaireAnswers = pgTable(
  'questionnaire_answers',
  {
    id: id(),
    patientId: ofPatient(),
    instrument: text().$type<QuestionnaireKey>().notNull(),
    answers: jsonb().$type<QuestionnaireValues['answers']>().notNull(),
    answeredOn: date({ mode: 'string' }).notNull(),
    /** Thoughts of self-harm were told: someone speaks with the patient the same day. */
    selfHarm: boolean()
      .notNull()
      .generatedAlwaysAs(
        sql`instrument = 'phq-9' and coalesce(answers ->> 8, '0') in ('1', '2', '3')`,
      ),
    endedAt: instant(),
    endedBy: uuid().references(() => users.id),
    endedReason: text(),
    ...attribution(),
  },
  (t) => [
    index('questionnaire_answers_patient').on(t.patientId, t.answeredOn),
    index('questionnaire_answers_follow_up')
      .on(t.recordedAt)
      .where(sql`self_harm and ended_at is null and entered_in_error_at is null`),
    check(
      'questionnaire_answers_length',
      sql`jsonb_array_length(${t.answers}) = case ${t.instrument} when 'phq-2' then 2 when 'phq-9' then 9 when 'gad-7' then 7 when 'dasi' then 12 else -1 end`,
    ),
    check('questionnaire_answers_closed_by_someone', endedWhole(t)),
    check('questionnaire_answers_closed_follow_up', sql`${t.endedAt} is null or ${t.selfHarm}`),
  ],
);
