import type { Answers, Complete, FrequencyAnswer, Incomplete } from './answers';
import { bandOf, missingItems, sumOf } from './answers';

export const gad7Source =
  'GAD-7: Spitzer et al. Arch Intern Med 2006;166:1092–1097; 10 or more 89 % sensitive, 82 % specific';

export const anxietyBands = ['minimal', 'mild', 'moderate', 'severe'] as const;
export type AnxietyBand = (typeof anxietyBands)[number];

const bands: readonly (readonly [number, AnxietyBand])[] = [
  [5, 'mild'],
  [10, 'moderate'],
  [15, 'severe'],
];

/** Severity of a total, 0–21. */
export const anxietyBandOf = (total: number): AnxietyBand => bandOf(total, bands, 'minimal');

/**
 * Scores seven answers of 0–3; all are needed, since no rule for missing ones was published with it.
 * @throws RangeError for other than seven answers or an answer outside 0–3
 * @see gad7Source
 */
export function scoreGad7(answers: Answers<FrequencyAnswer>): Complete<AnxietyBand> | Incomplete {
  const missing = missingItems(answers, 7);
  if (missing.length > 0) return { state: 'incomplete', missing };
  const total = sumOf(answers);
  return { state: 'complete', total, band: anxietyBandOf(total) };
}
