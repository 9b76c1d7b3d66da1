import type { Answers, Complete, FrequencyAnswer, Incomplete } from './answers';
import { missingItems, sumOf } from './answers';

export const phq2Source =
  'PHQ-2: Arroll et al. Ann Fam Med 2010;8:348–353: 3 or more 61 % sensitive, 92 % specific; 2 or more 86 and 78 %';

export type Phq2Band = 'negative' | 'positive';

/** From this total on the longer questionnaire is due. */
const positiveFrom = 3;

export const phq2BandOf = (total: number): Phq2Band =>
  total >= positiveFrom ? 'positive' : 'negative';

/**
 * Scores two answers of 0–3; both are needed.
 * @throws RangeError for other than two answers or an answer outside 0–3
 * @see phq2Source
 */
export function scorePhq2(answers: Answers<FrequencyAnswer>): Complete<Phq2Band> | Incomplete {
  const missing = missingItems(answers, 2);
  if (missing.length > 0) return { state: 'incomplete', missing };
  const total = sumOf(answers);
  return { state: 'complete', total, band: phq2BandOf(total) };
}
