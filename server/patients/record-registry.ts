import type { PgTable } from 'drizzle-orm/pg-core';
import type { Role } from '@shared/contracts/accounts-contract';
import type { RecordKind } from '@shared/contracts/record-contract';
import {
  bodyMeasurements,
  cardiacDevices,
  chairStands,
  clinicalEvents,
  conditions,
  diagnoses,
  exerciseTests,
  medicationReviews,
  medications,
  questionnaireAnswers,
  restingEcgs,
  restingRates,
  restrictions,
  rhythmRecords,
  riskStratifications,
  thresholds,
  walkTests,
} from '../database/schema';
import { chartRoles } from './patients-policy';

interface RecordRegistration {
  /** The columns that the values of the contract name, beside those of attribution. */
  readonly table: PgTable;
  /** The value that says of when the entry is; null: of when it was recorded. */
  readonly dateField: string | null;
  /** Who may enter it. */
  readonly writers: readonly Role[];
}

const entered = (table: PgTable, dateField: string | null): RecordRegistration => ({
  table,
  dateField,
  writers: chartRoles,
});

/** Where each kind of entry is kept, dated by what, and who may make it. */
export const recordRegistry: Readonly<Record<RecordKind, RecordRegistration>> = {
  diagnoses: entered(diagnoses, 'onsetOn'),
  conditions: entered(conditions, null),
  'clinical-events': entered(clinicalEvents, 'occurredOn'),
  'body-measurements': entered(bodyMeasurements, 'measuredOn'),
  rhythms: entered(rhythmRecords, 'observedOn'),
  'resting-rates': entered(restingRates, 'measuredOn'),
  medications: entered(medications, 'startedOn'),
  'medication-reviews': entered(medicationReviews, null),
  devices: entered(cardiacDevices, 'checkedOn'),
  'exercise-tests': entered(exerciseTests, 'performedOn'),
  thresholds: entered(thresholds, 'foundOn'),
  'walk-tests': entered(walkTests, 'performedOn'),
  'risk-stratifications': entered(riskStratifications, 'assessedOn'),
  'resting-ecgs': entered(restingEcgs, 'observedOn'),
  'chair-stands': entered(chairStands, 'performedOn'),
  restrictions: entered(restrictions, 'orderedOn'),
  questionnaires: entered(questionnaireAnswers, 'answeredOn'),
};
