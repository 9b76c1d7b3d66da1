import type { Seconds } from '../units';

/** When the clock was stopped; the cut-offs differ by it, so a time is kept with it. */
export const standEndings = ['standing-fifth-time', 'seated-fifth-time'] as const;
export type StandEnding = (typeof standEndings)[number];

/** Times above these are worse than average at an age, s. Bohannon. Percept Mot Skills 2006;103:215–222. */
const averages = [
  { from: 60, to: 69, time: 11.4 },
  { from: 70, to: 79, time: 12.6 },
  { from: 80, to: 89, time: 14.8 },
] as const;

/** The time above which five stands are worse than average, s; null outside 60–89 years, where none was published. */
export const averageStandTime = (ageYears: number): number | null =>
  averages.find(({ from, to }) => ageYears >= from && ageYears < to + 1)?.time ?? null;

/** Whether a time is worse than average at the age; null where no average was published. */
export function isWorseThanAverage(time: Seconds, ageYears: number): boolean | null {
  const average = averageStandTime(ageYears);
  return average === null ? null : time > average;
}

/** Published marks, s: recurrent falls above 15, disability above 13.6, change of 2.3 (of people with vestibular disorders). */
export const standMarks = { recurrentFalls: 15, disability: 13.6, importantChange: 2.3 } as const;

/**
 * Chair-stand points of the Short Physical Performance Battery: 4 to 11.19 s, 3 to 13.69, 2 to 16.69, 1 to 60, else 0.
 * @param time s; null when the patient could not do five stands
 * @param ending its clock stops at the fifth standing: a time to the fifth sitting is longer, and gives no points
 * @see from memory; the same score shown in PMC7170430
 */
export function chairStandPoints(time: Seconds | null, ending: StandEnding): number | null {
  if (ending === 'seated-fifth-time') return null;
  if (time === null || time > 60) return 0;
  if (time <= 11.19) return 4;
  if (time <= 13.69) return 3;
  return time <= 16.69 ? 2 : 1;
}
