import { max, median } from 'simple-statistics';
import type { PrescriptionAnswer } from '../prescribing/answer';
import type { HeartRateRange } from '../prescribing/request';
import type { ProgressionPolicy } from './progression-policy';
import type { ProgressionReasonCode } from './reasons';
import type { SessionFacts, SessionReading } from './session-facts';

/** These may come from work alone: they hold it, and are reviewed when they come again. Every other symptom is reviewed at once. */
const minorSymptoms: ReadonlySet<string> = new Set([
  'shortness-of-breath',
  'leg-pain',
  'unusual-fatigue',
]);

/** What a session says of the next step, worst first. */
export interface SessionReport {
  /** Reasons to have it reviewed. */
  readonly alarms: readonly ProgressionReasonCode[];
  /** Reasons to make it easier. */
  readonly troubles: readonly ProgressionReasonCode[];
  /** Reasons to leave it as it is. */
  readonly holds: readonly ProgressionReasonCode[];
  /** Of the exercise readings; null when there is none. */
  readonly medianRate: number | null;
  readonly highestRate: number | null;
  readonly highestEffort: number | null;
}

/** A statistic of what was read; null when nothing was. */
const ifAny = (of: (values: number[]) => number, values: number[]): number | null =>
  values.length === 0 ? null : of(values);

const present = (values: readonly (number | null)[]): number[] =>
  values.filter((value): value is number => value !== null);

const when = <T>(isSo: boolean, code: T): T[] => (isSo ? [code] : []);

/** The range to read a session's rates against: the arms have one of their own, bouts too short to read have none. */
export function targetFor(
  { setting, shortBouts }: SessionFacts,
  { target, workloads }: PrescriptionAnswer,
): HeartRateRange | null {
  if (shortBouts) return null;
  if (setting?.modality !== 'arm') return target;
  const row = workloads.find((workload) => workload.modality === 'arm');
  return row?.modality === 'arm' ? row.target : target;
}

const isAbove = (value: number | null, limit: number | null | undefined): boolean =>
  value !== null && limit !== null && limit !== undefined && value > limit;

function symptomsOf({ readings }: SessionFacts): string[] {
  return readings.flatMap(({ symptoms }) => symptoms).filter((symptom) => symptom !== 'none');
}

function alarmsOf(session: SessionFacts, answer: PrescriptionAnswer): ProgressionReasonCode[] {
  const { readings } = session;
  const { ceiling, askLine, pressureCeiling, oxygenFloor } = answer;
  const some = (is: (reading: SessionReading) => boolean) => readings.some(is);
  return [
    ...when<ProgressionReasonCode>(
      some(({ heartRate }) => isAbove(heartRate, ceiling?.value)),
      'over-ceiling',
    ),
    ...when<ProgressionReasonCode>(
      some(({ heartRate, phase }) => phase === 'exercise' && isAbove(heartRate, askLine)),
      'over-ask-line',
    ),
    ...when<ProgressionReasonCode>(
      some(
        ({ systolic, diastolic }) =>
          isAbove(systolic, pressureCeiling?.systolic) ||
          isAbove(diastolic, pressureCeiling?.diastolic),
      ),
      'over-pressure',
    ),
    ...when<ProgressionReasonCode>(
      some(
        ({ oxygenSaturation: oxygen }) =>
          oxygen !== null && oxygenFloor !== null && oxygen < oxygenFloor,
      ),
      'under-oxygen',
    ),
    ...when<ProgressionReasonCode>(
      symptomsOf(session).some((symptom) => !minorSymptoms.has(symptom)),
      'symptom',
    ),
  ];
}

/** Rates are needed where there is anything to read them against. */
const needsRates = (answer: PrescriptionAnswer): boolean =>
  answer.target !== null || answer.ceiling !== null || answer.askLine !== null;

/** Reads a session against the prescription in force. */
export function readSession(
  session: SessionFacts,
  answer: PrescriptionAnswer,
  policy: ProgressionPolicy,
): SessionReport {
  const exercise = session.readings.filter(({ phase }) => phase === 'exercise');
  const rates = present(exercise.map(({ heartRate }) => heartRate));
  const efforts = present(exercise.map(({ perceivedExertion }) => perceivedExertion));
  const upperRate = targetFor(session, answer)?.upper;
  const upperEffort = answer.perceivedExertion.upper;
  const [medianRate, medianEffort] = [ifAny(median, rates), ifAny(median, efforts)];
  const isRecorded =
    efforts.length > 0 && (!needsRates(answer) || rates.length >= policy.leastReadings);
  return {
    alarms: alarmsOf(session, answer),
    troubles: [
      ...when<ProgressionReasonCode>(isAbove(medianRate, upperRate), 'rate-above'),
      ...when<ProgressionReasonCode>(isAbove(medianEffort, upperEffort), 'effort-above'),
    ],
    holds: [
      ...when<ProgressionReasonCode>(
        symptomsOf(session).some((symptom) => minorSymptoms.has(symptom)),
        'minor-symptom',
      ),
      ...when<ProgressionReasonCode>(isAbove(ifAny(max, rates), upperRate), 'one-rate-above'),
      ...when<ProgressionReasonCode>(isAbove(ifAny(max, efforts), upperEffort), 'one-effort-above'),
      ...when<ProgressionReasonCode>(!isRecorded, 'not-recorded'),
      ...when<ProgressionReasonCode>(
        session.readings.every(({ symptoms }) => symptoms.length === 0),
        'symptoms-not-asked',
      ),
      ...when<ProgressionReasonCode>(session.doseMissed, 'dose-missed'),
    ],
    medianRate,
    highestRate: ifAny(max, rates),
    highestEffort: ifAny(max, efforts),
  };
}
