import { idAt } from './dice';
import type { RowOf } from './row-of';

/** The entries of a record, by table. */
export interface RecordRows {
  readonly diagnoses: RowOf<'diagnoses'>[];
  readonly conditions: RowOf<'conditions'>[];
  readonly clinicalEvents: RowOf<'clinicalEvents'>[];
  readonly bodyMeasurements: RowOf<'bodyMeasurements'>[];
  readonly rhythmRecords: RowOf<'rhythmRecords'>[];
  readonly restingRates: RowOf<'restingRates'>[];
  readonly medications: RowOf<'medications'>[];
  readonly medicationReviews: RowOf<'medicationReviews'>[];
  readonly cardiacDevices: RowOf<'cardiacDevices'>[];
  readonly exerciseTests: RowOf<'exerciseTests'>[];
  readonly thresholds: RowOf<'thresholds'>[];
  readonly walkTests: RowOf<'walkTests'>[];
  readonly riskStratifications: RowOf<'riskStratifications'>[];
  readonly restingEcgs: RowOf<'restingEcgs'>[];
  readonly chairStands: RowOf<'chairStands'>[];
  readonly restrictions: RowOf<'restrictions'>[];
  readonly questionnaireAnswers: RowOf<'questionnaireAnswers'>[];
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
  restingEcgs: [],
  chairStands: [],
  restrictions: [],
  questionnaireAnswers: [],
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
