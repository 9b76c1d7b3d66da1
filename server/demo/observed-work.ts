import { max, median, min } from 'simple-statistics';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import type { Day } from './days';

/** A reading at exercise, as it stands after amendments. */
export interface EffortReading {
  readonly visit: string;
  readonly day: Day;
  readonly heartRate: number;
  readonly effort: number;
}

const steadySpread = 10;
const sessions = 6;
const days = 90;

/** The median rate at effort 9–13 over the last steady sessions since a change, as the worksheet derives it. */
export function observedWorkOn(
  readings: readonly EffortReading[],
  day: Day,
  changedOn: Day,
): PrescriptionRequestInput['observedWork'] {
  const counted = readings.filter(
    (each) =>
      each.effort >= 9 && each.effort <= 13 && each.day > changedOn && day - each.day <= days,
  );
  const visits = [...new Set(counted.map(({ visit }) => visit))]
    .map((visit) => counted.filter((each) => each.visit === visit))
    .filter((visit) => {
      const rates = visit.map(({ heartRate }) => heartRate);
      return max(rates) - min(rates) <= steadySpread;
    })
    .slice(-sessions);
  if (visits.length < 2) return null;
  const used = visits.flat();
  const efforts = used.map(({ effort }) => effort);
  const [lower, upper] = [min(efforts), max(efforts)];
  return {
    medianHeartRate: median(used.map(({ heartRate }) => heartRate)),
    sessions: visits.length,
    perceivedExertion:
      lower < upper
        ? { lower, upper }
        : lower === 13
          ? { lower: 12, upper }
          : { lower, upper: upper + 1 },
  };
}
