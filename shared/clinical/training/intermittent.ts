import type { Mets, Minutes } from '../../units';
import { minutes } from '../../units';
import type { PolicyNumbers, PolicyValues } from '../policy-numbers';
import { defaultsOf } from '../policy-numbers';

/** What a program sets for people who cannot yet work on without a pause. */
export const intermittentNumbers = {
  underMets: {
    label: 'Intermittent bouts with a peak under',
    unit: 'METs',
    lowest: 2,
    highest: 5,
    default: 3,
    source: 'ACSM: several short bouts a day under 3 METs; from memory',
  },
  underMinutes: {
    label: 'Intermittent bouts when the longest managed bout is under',
    unit: 'min',
    lowest: 5,
    highest: 20,
    default: 10,
    source: 'Common practice',
  },
  boutMinutes: {
    label: 'First length of a bout',
    unit: 'min',
    lowest: 1,
    highest: 10,
    default: 5,
    source: 'Bouts of 3–10 minutes; common practice, from memory',
  },
  restMinutes: {
    label: 'Pause between bouts',
    unit: 'min',
    lowest: 1,
    highest: 5,
    default: 2,
    source: 'Common practice',
  },
  totalMinutes: {
    label: 'First sum of the bouts',
    unit: 'min',
    lowest: 10,
    highest: 30,
    default: 15,
    source: 'Common practice',
  },
  mostMinutes: {
    label: 'Most sum of the bouts; then they grow fewer',
    unit: 'min',
    lowest: 20,
    highest: 45,
    default: 30,
    source: 'Common practice',
  },
  stepMinutes: {
    label: 'A bout is lengthened by',
    unit: 'min',
    lowest: 1,
    highest: 5,
    default: 2,
    source: 'Common practice',
  },
} as const satisfies PolicyNumbers;

export type IntermittentPolicy = PolicyValues<typeof intermittentNumbers>;
export const defaultIntermittentPolicy: IntermittentPolicy = defaultsOf(intermittentNumbers);

export interface BoutPattern {
  readonly bouts: number;
  readonly minutesEach: Minutes;
  /** 0 when there is one bout: continuous. */
  readonly restMinutes: Minutes;
  /** Work alone, without pauses. */
  readonly totalMinutes: Minutes;
}

/**
 * Whether to begin with intermittent bouts: low peak, or no bout of ten minutes managed yet.
 * @param peak of a test that the rules accept; null when there is none
 * @param longestBout the longest that the patient has managed; null when not tried
 * @returns null when neither is known: try a short bout and see
 */
export function needsIntermittent(
  peak: Mets | null,
  longestBout: Minutes | null,
  { underMets, underMinutes }: IntermittentPolicy,
): boolean | null {
  if (longestBout !== null) return longestBout < underMinutes;
  return peak === null ? null : peak < underMets;
}

const patternOf = (bouts: number, each: number, rest: number): BoutPattern => ({
  bouts,
  minutesEach: minutes(each),
  restMinutes: minutes(bouts === 1 ? 0 : rest),
  totalMinutes: minutes(bouts * each),
});

/** The bouts to begin with; no longer than the longest that was managed, nor together than the policy's first sum. */
export function firstBouts(
  longestBout: Minutes | null,
  { boutMinutes, totalMinutes, restMinutes }: IntermittentPolicy,
): BoutPattern {
  const each = longestBout === null ? boutMinutes : Math.min(boutMinutes, Math.max(1, longestBout));
  return patternOf(Math.max(1, Math.floor(totalMinutes / each)), each, restMinutes);
}

/** The next pattern: each bout longer, and fewer of them once their sum would pass the most; one bout is continuous work. */
export function longerBouts(
  { minutesEach, bouts }: BoutPattern,
  { stepMinutes, mostMinutes, restMinutes }: IntermittentPolicy,
): BoutPattern {
  const each = Math.min(minutesEach + stepMinutes, mostMinutes);
  return patternOf(Math.min(bouts, Math.max(1, Math.floor(mostMinutes / each))), each, restMinutes);
}
