import type { SexAtBirth } from '@shared/clinical/prescribing/request';
import type { PatientRecord, RecordEntry, RecordKind } from '@shared/contracts/record-contract';
import { ageOn } from '@shared/scheduling/age';

/** What values are computed beside: the patient, the record, and the site's date. */
export interface LineContext {
  readonly patient: { readonly birthDate: string; readonly sexAtBirth: SexAtBirth } | null;
  readonly record: PatientRecord;
  readonly today: string;
}

type Values = Readonly<Record<string, unknown>>;

/** A number that was typed whole; null while it is not. */
export const numberOf = (values: Values, key: string): number | null => {
  const value = values[key];
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
};

/** One of the words of a field; null where none is chosen. */
export const wordOf = <T extends string>(values: Values, key: string): T | null => {
  const value = values[key];
  return typeof value === 'string' && value !== '' ? (value as T) : null;
};

export const dateOf = (values: Values, key: string, { today }: LineContext): string =>
  wordOf(values, key) ?? today;

export const ageAt = ({ patient }: LineContext, date: string): number | null =>
  patient === null ? null : ageOn(patient.birthDate, date);

export const stands = (entry: Pick<RecordEntry, 'enteredInErrorAt'>): boolean =>
  entry.enteredInErrorAt === null;

/** The entries of a kind that stand, the newest first. */
export const standing = <K extends RecordKind>(record: PatientRecord, kind: K): PatientRecord[K] =>
  (record[kind] as { enteredInErrorAt: string | null }[]).filter(stands) as PatientRecord[K];

/** The last measurement up to a date; null where there is none. */
export function bodyOn(record: PatientRecord, key: 'heightCm' | 'weightKg', date: string) {
  const measured = standing(record, 'body-measurements').filter(
    ({ values }) => values[key] !== null,
  );
  const found = measured.find(({ values }) => values.measuredOn <= date) ?? measured[0];
  return found?.values[key] ?? null;
}

export const rounded = (value: number, digits = 0): string => value.toFixed(digits);
