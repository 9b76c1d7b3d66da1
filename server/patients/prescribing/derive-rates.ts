import { max, mean, median, min } from 'simple-statistics';
import type { PrefilledInputs } from '@shared/contracts/prescribing-inputs-contract';
import { addDays, daysBetween } from '@shared/scheduling/wall-time';
import type { LatestChanges } from './derive-changes';
import {
  isOld,
  nothingEntered,
  oldAfterDays,
  type Derived,
  type ExerciseReading,
  type RecordFacts,
} from './record-facts';

const restingReadings = 3;

/**
 * Seated: the mean of the last three readings of the last 30 days, none of before the last change of rate-acting drugs;
 * spread: the highest less the lowest of these, null of a single one. Standing: the latest of them that has one.
 */
export function restingOf(
  { record }: RecordFacts,
  { drugs }: LatestChanges,
  today: string,
): Derived<PrefilledInputs['resting']> {
  const [last, ...earlier] = record['resting-rates'];
  if (!last) {
    const value = { seated: null, standing: null, spread: null };
    return { value, origin: nothingEntered('No resting rate entered') };
  }
  const from = addDays(today, -oldAfterDays.resting);
  const counts = ({ values }: typeof last) =>
    values.measuredOn >= from && (drugs === null || values.measuredOn >= drugs.date);
  const used = [last, ...(counts(last) ? earlier.filter(counts) : [])].slice(0, restingReadings);
  const seated = used.map(({ values }) => values.seated);
  const single = used.length === 1;
  const beforeChange = drugs !== null && last.values.measuredOn < drugs.date;
  const text = single ? 'Seated, one reading' : `Seated, mean of the last ${used.length} readings`;
  return {
    value: {
      seated: mean(seated),
      standing: used.find(({ values }) => values.standing !== null)?.values.standing ?? null,
      spread: single ? null : max(seated) - min(seated),
    },
    origin: {
      text: beforeChange ? `${text}, before ${drugs.text}` : text,
      date: last.values.measuredOn,
      old: beforeChange || isOld(last.values.measuredOn, today, oldAfterDays.resting),
      entryId: single ? last.id : null,
    },
  };
}

/** Effort, Borg 6–20, between which exercise counts as observed work (rule 4). */
const observedEffort = { lowest: 9, highest: 13 } as const;
/** Rates of one session at such effort that lie further apart (bpm) are not of steady work; ours, as the resting spread. */
const steadySpread = 10;
const observedSessions = 6;
const observedDays = 90;

const atEffort = ({ perceivedExertion }: ExerciseReading): boolean =>
  perceivedExertion >= observedEffort.lowest && perceivedExertion <= observedEffort.highest;

function sessionsOf(readings: readonly ExerciseReading[]): ExerciseReading[][] {
  const sessions = new Map<string, ExerciseReading[]>();
  for (const reading of readings.filter(atEffort)) {
    const session = sessions.get(reading.sessionRecordId) ?? [];
    sessions.set(reading.sessionRecordId, [...session, reading]);
  }
  return [...sessions.values()];
}

const isSteady = (session: readonly ExerciseReading[]): boolean => {
  const rates = session.map(({ heartRate }) => heartRate);
  return max(rates) - min(rates) <= steadySpread;
};

/** The efforts seen, as a range whose ends differ, inside the observed efforts. */
function effortOf(readings: readonly ExerciseReading[]): { lower: number; upper: number } {
  const efforts = readings.map(({ perceivedExertion }) => perceivedExertion);
  const [lower, upper] = [min(efforts), max(efforts)];
  if (lower < upper) return { lower, upper };
  return lower === observedEffort.highest
    ? { lower: lower - 1, upper }
    : { lower, upper: upper + 1 };
}

/**
 * The median rate at steady work, effort 9–13, of the last sessions on today's drugs, rhythm and device, with no event
 * since; null of fewer than two sessions. Sessions on the day of a change do not count.
 */
export function observedWorkOf(
  { readings }: RecordFacts,
  changes: LatestChanges,
  today: string,
): Derived<PrefilledInputs['observedWork']> {
  const since = [changes.drugs, changes.rhythmOrDevice, changes.event].flatMap((change) =>
    change === null ? [] : [change.date],
  );
  const counts = ({ localDate }: ExerciseReading) =>
    daysBetween(localDate, today) <= observedDays && since.every((date) => localDate > date);
  const newestFirst = [...readings.filter(counts)].sort((a, b) =>
    a.localDate < b.localDate ? 1 : -1,
  );
  const sessions = sessionsOf(newestFirst).filter(isSteady).slice(0, observedSessions);
  if (sessions.length < 2) {
    return {
      value: null,
      origin: nothingEntered(
        'Fewer than 2 signed sessions at steady work, effort 9–13, as of today',
      ),
    };
  }
  const used = sessions.flat();
  return {
    value: {
      medianHeartRate: median(used.map(({ heartRate }) => heartRate)),
      sessions: sessions.length,
      perceivedExertion: effortOf(used),
    },
    origin: {
      text: `Median rate at steady work, effort 9–13, of ${sessions.length} sessions on today’s drugs`,
      date: used[0]?.localDate ?? null,
      old: false,
      entryId: null,
    },
  };
}
