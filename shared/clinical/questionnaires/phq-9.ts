import type { Answers, Complete, FrequencyAnswer, Incomplete } from './answers';
import { bandOf, missingItems, sumOf } from './answers';

export const phq9Source =
  'PHQ-9: Kroenke et al. J Gen Intern Med 2001;16:606–613; filling up to two missing items from memory';

const items = 9;
/** More missing items than this, and there is no score. From memory. */
const mostMissing = 2;

export const depressionBands = [
  'minimal',
  'mild',
  'moderate',
  'moderately severe',
  'severe',
] as const;
export type DepressionBand = (typeof depressionBands)[number];

const bands: readonly (readonly [number, DepressionBand])[] = [
  [5, 'mild'],
  [10, 'moderate'],
  [15, 'moderately severe'],
  [20, 'severe'],
];

/** Severity of a total, 0–27. */
export const depressionBandOf = (total: number): DepressionBand => bandOf(total, bands, 'minimal');

/** From this total on the screen is positive. Sensitivity 88, specificity 88 (Kroenke 2001); 74 and 91 (Arroll 2010). */
const positiveFrom = 10;

/**
 * Item 9, thoughts of being better off dead or of self-harm:
 * - follow-up-today: above zero, whatever the total: someone speaks with the patient the same day
 * - ask: not answered, and silence is no *no*
 */
export type SelfHarmFlag = 'follow-up-today' | 'ask' | 'none';

export const selfHarmFlagOf = (item9: number | null): SelfHarmFlag => {
  if (item9 === null) return 'ask';
  return item9 > 0 ? 'follow-up-today' : 'none';
};

/** One or two items missing, filled with the mean of the others; never shown as a complete score. */
export interface Prorated {
  readonly state: 'prorated';
  readonly missing: readonly number[];
  /** Mean of the answered items times nine, not rounded. */
  readonly estimate: number;
  /** The estimate to the nearest whole, half up. */
  readonly total: number;
  readonly band: DepressionBand;
}

export type Phq9Score = (Complete<DepressionBand> | Prorated | Incomplete) & {
  readonly selfHarm: SelfHarmFlag;
};

/** Mean of the answered items times nine. @throws RangeError when nothing was answered */
export function prorateTotal(sum: number, answered: number): number {
  if (answered < 1) throw new RangeError('PHQ-9: no item was answered');
  return (sum / answered) * items;
}

function scored(
  answers: Answers<FrequencyAnswer>,
): Complete<DepressionBand> | Prorated | Incomplete {
  const missing = missingItems(answers, items);
  if (missing.length > mostMissing) return { state: 'incomplete', missing };
  const sum = sumOf(answers);
  if (missing.length === 0) return { state: 'complete', total: sum, band: depressionBandOf(sum) };
  const estimate = prorateTotal(sum, items - missing.length);
  const total = Math.round(estimate);
  return { state: 'prorated', missing, estimate, total, band: depressionBandOf(total) };
}

/**
 * Scores nine answers of 0–3; the question on functioning is not summed. Item 9 is flagged by itself, also when there is no score.
 * @throws RangeError for other than nine answers or an answer outside 0–3
 * @see phq9Source
 */
export const scorePhq9 = (answers: Answers<FrequencyAnswer>): Phq9Score => ({
  ...scored(answers),
  selfHarm: selfHarmFlagOf(answers[items - 1] ?? null),
});

/** Whether the screen is positive; null without a score. */
export const isPhq9Positive = (score: Phq9Score): boolean | null =>
  score.state === 'incomplete' ? null : score.total >= positiveFrom;
