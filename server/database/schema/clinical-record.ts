import { sql } from 'drizzle-orm';
import { check, date, index, pgEnum, pgTable, real, text } from 'drizzle-orm/pg-core';
import { id } from './columns';
import { diagnosisKind } from './patients';
import { attribution, ofPatient } from './record-entry';

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
