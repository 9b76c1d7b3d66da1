import type { DiagnosisKind } from '@shared/contracts/patients-contract';
import type { InputOrigin } from '@shared/contracts/prescribing-inputs-contract';
import type { PatientRecord, RecordEntry } from '@shared/contracts/record-contract';
import type { SexAtBirth } from '@shared/clinical/prescribing';
import { addDays } from '@shared/scheduling/wall-time';

/** A reading at exercise of a signed record, on the local date of its session. */
export interface ExerciseReading {
  readonly sessionRecordId: string;
  readonly localDate: string;
  readonly heartRate: number;
  readonly perceivedExertion: number;
}

/** What inputs are derived from; entries in error are left out already. */
export interface RecordFacts {
  readonly patient: { readonly birthDate: string; readonly sexAtBirth: SexAtBirth };
  readonly course: {
    readonly firstSessionOn: string | null;
    readonly qualifyingDiagnosis: DiagnosisKind;
  } | null;
  readonly record: PatientRecord;
  readonly readings: readonly ExerciseReading[];
  /** After how many days a test no longer counts, by the policy. */
  readonly testValidDays: number;
}

/** An input with where it comes from. */
export interface Derived<T> {
  readonly value: T;
  readonly origin: InputOrigin;
}

/**
 * After how many days an entry is called old, which warns and changes nothing: our own figures from common practice. How
 * long a test counts is the policy's own number.
 */
export const oldAfterDays = {
  resting: 30,
  weight: 90,
  height: 3650,
  rhythm: 90,
  medicationReview: 30,
  devices: 180,
  walkTest: 90,
  risk: 180,
} as const;

export const isOld = (date: string, today: string, days: number): boolean =>
  addDays(date, days) < today;

export const nothingEntered = (text: string): InputOrigin => ({
  text,
  date: null,
  old: false,
  entryId: null,
});

/** The record without what was entered in error. */
export function withoutErrors(record: PatientRecord): PatientRecord {
  const kept = Object.entries(record).map(([kind, entries]) => [
    kind,
    (entries as RecordEntry[]).filter((entry) => entry.enteredInErrorAt === null),
  ]);
  return Object.fromEntries(kept) as PatientRecord;
}
