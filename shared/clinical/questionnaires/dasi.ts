import type { Mets, Vo2 } from '../../units';
import { metsOf, toMillionths, vo2 } from '../../units';
import type { Answers, Incomplete } from './answers';

export const dasiSource =
  'Duke Activity Status Index: Hlatky et al. Am J Cardiol 1989;64:651–654; VO2 in mL/kg/min, though one page prints mL/min';

/** The UK version replaces item 10 by another activity: scores are kept with their version. */
export const dasiVersions = ['original', 'united-kingdom'] as const;
export type DasiVersion = (typeof dasiVersions)[number];

/** Weight of a *yes*, in the order of the questionnaire. */
const weights = [2.75, 1.75, 2.75, 5.5, 8, 2.7, 3.5, 8, 4.5, 5.25, 6, 7.5] as const;

export interface DasiScore {
  readonly state: 'complete';
  readonly version: DasiVersion;
  /** 0–58.2. */
  readonly total: number;
  /** 9.6–34.6 mL/kg/min: no answer can give less, or more. */
  readonly peakVo2: Vo2;
  readonly peakMets: Mets;
}

/** Peak uptake of a score: 0.43 × score + 9.6, mL/kg/min. */
export const peakVo2OfDasi = (total: number): Vo2 => vo2(0.43 * total + 9.6);

/**
 * Scores twelve answers of yes or no; all are needed, since a missing one would count as *no*.
 * @throws RangeError for other than twelve answers
 * @see dasiSource
 */
export function scoreDasi(
  answers: Answers<boolean>,
  version: DasiVersion = 'original',
): DasiScore | Incomplete {
  if (answers.length !== weights.length) throw new RangeError('DASI: 12 answers are expected');
  const missing = answers.flatMap((answer, index) => (answer === null ? [index + 1] : []));
  if (missing.length > 0) return { state: 'incomplete', missing };
  const total = toMillionths(
    weights.reduce((sum, weight, index) => sum + (answers[index] === true ? weight : 0), 0),
  );
  const peakVo2 = peakVo2OfDasi(total);
  return { state: 'complete', version, total, peakVo2, peakMets: metsOf(peakVo2) };
}
