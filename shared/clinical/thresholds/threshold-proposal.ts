import type { RateActingDrug, Rhythm, TestEnding, ThresholdKind } from '../prescribing/request';
import { bpm } from '../../units';
import { daysBetween } from '../../scheduling/wall-time';
import { whyNotSuperseded } from '../threshold-life';
import type { EcgHindrance } from './ecg-readable';
import { ecgReadable } from './ecg-readable';

interface Entry<Values> {
  readonly id: string;
  readonly values: Values;
  readonly enteredInErrorAt: string | null;
}

interface TestFacts {
  readonly performedOn: string;
  readonly peakHeartRate: number;
  readonly endedBy: TestEnding;
  readonly signs: readonly { readonly kind: string }[];
}

interface ThresholdFacts {
  readonly kind: ThresholdKind;
  readonly heartRate: number;
  readonly foundOn: string;
  readonly exerciseTestId: string | null;
}

/** What of a record tells whether a threshold's place was taken; each list the newest first. */
export interface ThresholdRecord {
  readonly thresholds: readonly (Entry<ThresholdFacts> & { readonly ended: unknown })[];
  readonly 'exercise-tests': readonly Entry<TestFacts>[];
  readonly medications: readonly Entry<{
    readonly rateActing: RateActingDrug | null;
    readonly startedOn: string;
    readonly stoppedOn: string | null;
  }>[];
  readonly 'medication-reviews': readonly { readonly enteredInErrorAt: string | null }[];
  readonly 'resting-ecgs': readonly Entry<{
    readonly hindrances: readonly EcgHindrance[];
    readonly observedOn: string;
  }>[];
  readonly 'clinical-events': readonly Entry<{ readonly occurredOn: string }>[];
  readonly rhythms: readonly Entry<{ readonly rhythm: Rhythm; readonly observedOn: string }>[];
}

const stands = (entry: { readonly enteredInErrorAt: string | null }): boolean =>
  entry.enteredInErrorAt === null;

const kindOfSign: Readonly<Record<string, ThresholdKind>> = {
  'st-change': 'ischemia',
  angina: 'angina',
  arrhythmia: 'arrhythmia',
};

/** Rhythms in which the ventricle is paced. */
const paced: readonly Rhythm[] = ['sinus-tracked', 'sensor-paced', 'fixed-paced'];

/** Whether the ECG could show ischemia on a date. */
function ecgOn(record: ThresholdRecord, date: string) {
  const ecg = record['resting-ecgs'].find((e) => stands(e) && e.values.observedOn <= date);
  const rhythm = record.rhythms.find((e) => stands(e) && e.values.observedOn <= date);
  const verified = record['medication-reviews'].some(stands);
  const digoxin = record.medications.some(
    (drug) =>
      stands(drug) &&
      drug.values.rateActing === 'digoxin' &&
      drug.values.startedOn <= date &&
      (drug.values.stoppedOn === null || drug.values.stoppedOn >= date),
  );
  return ecgReadable({
    hindrances: ecg?.values.hindrances ?? null,
    paced: rhythm !== undefined && paced.includes(rhythm.values.rhythm),
    digoxin: digoxin || (verified ? false : null),
  });
}

/** No rate-acting drug started or stopped from one date to another, both days counted; null: never verified. */
function sameDrugsBetween(record: ThresholdRecord, from: string, to: string): boolean | null {
  if (!record['medication-reviews'].some(stands)) return null;
  const isIn = (date: string | null) => date !== null && date >= from && date <= to;
  return !record.medications.some(
    (drug) =>
      stands(drug) &&
      drug.values.rateActing !== null &&
      (isIn(drug.values.startedOn) || isIn(drug.values.stoppedOn)),
  );
}

function foundIn(record: ThresholdRecord, test: Entry<TestFacts>): ThresholdKind[] {
  const linked = record.thresholds
    .filter((entry) => stands(entry) && entry.values.exerciseTestId === test.id)
    .map(({ values }) => values.kind);
  const signs = test.values.signs.flatMap(({ kind }) => kindOfSign[kind] ?? []);
  return [...linked, ...signs];
}

/**
 * Why a test of the record does not take a threshold's place; [] when it may, once a person confirms.
 * @param today the local date
 */
export function objectionsTo(
  record: ThresholdRecord,
  threshold: Entry<ThresholdFacts>,
  test: Entry<TestFacts>,
  today: string,
): string[] {
  const { kind, heartRate, foundOn } = threshold.values;
  const { performedOn, peakHeartRate, endedBy } = test.values;
  const { state } = ecgOn(record, performedOn);
  return whyNotSuperseded(
    { kind, heartRate: bpm(heartRate), daysAgo: daysBetween(foundOn, today) },
    {
      daysAgo: daysBetween(performedOn, today),
      peakHeartRate: bpm(peakHeartRate),
      endedBy,
      found: foundIn(record, test),
      ecgShowsIschemia: state === 'unknown' ? null : state === 'can',
      sameRateActingDrugs: sameDrugsBetween(record, foundOn, performedOn),
      eventSince: record['clinical-events'].some(
        (event) => stands(event) && event.values.occurredOn >= performedOn,
      ),
    },
  );
}

/** The latest test that may take an active threshold's place; null when there is none. It is proposed, never carried out. */
export function supersedingTest(
  record: ThresholdRecord,
  threshold: ThresholdRecord['thresholds'][number],
  today: string,
): string | null {
  if (!stands(threshold) || threshold.ended !== null) return null;
  const clean = record['exercise-tests'].find(
    (test) => stands(test) && objectionsTo(record, threshold, test, today).length === 0,
  );
  return clean?.id ?? null;
}
