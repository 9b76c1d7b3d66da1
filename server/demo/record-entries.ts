import type * as schema from '../database/schema';
import { idAt } from './dice';

type Row<T extends keyof typeof schema> = (typeof schema)[T] extends { $inferInsert: infer R }
  ? R
  : never;

/** The entries of a record, by table. */
export interface RecordRows {
  readonly diagnoses: Row<'diagnoses'>[];
  readonly conditions: Row<'conditions'>[];
  readonly clinicalEvents: Row<'clinicalEvents'>[];
  readonly bodyMeasurements: Row<'bodyMeasurements'>[];
  readonly rhythmRecords: Row<'rhythmRecords'>[];
  readonly restingRates: Row<'restingRates'>[];
  readonly medications: Row<'medications'>[];
  readonly medicationReviews: Row<'medicationReviews'>[];
  readonly cardiacDevices: Row<'cardiacDevices'>[];
  readonly exerciseTests: Row<'exerciseTests'>[];
  readonly thresholds: Row<'thresholds'>[];
  readonly walkTests: Row<'walkTests'>[];
  readonly riskStratifications: Row<'riskStratifications'>[];
}

export const emptyRecord = (): RecordRows => ({
  diagnoses: [],
  conditions: [],
  clinicalEvents: [],
  bodyMeasurements: [],
  rhythmRecords: [],
  restingRates: [],
  medications: [],
  medicationReviews: [],
  cardiacDevices: [],
  exerciseTests: [],
  thresholds: [],
  walkTests: [],
  riskStratifications: [],
});

/** Who writes in whose record, and when. */
export interface Scribe {
  readonly personKey: string;
  readonly patientId: string;
  readonly by: string;
  readonly at: Date;
}

export const entry = ({ personKey, patientId, by, at }: Scribe, ...name: (string | number)[]) => ({
  id: idAt(at, personKey, ...name),
  patientId,
  recordedAt: at,
  recordedBy: by,
  enteredInErrorAt: null,
  enteredInErrorBy: null,
});
