import type { Centimeters, Kilograms, Vo2 } from '../../units';
import { inchesOf, poundsOf, vo2 } from '../../units';
import type { KnownSex } from '../known-sex';

export interface CapacityFacts {
  readonly ageYears: number;
  readonly sexAtBirth: KnownSex;
  readonly weight: Kilograms;
}

export const friend2017Source =
  'FRIEND 2017, treadmill: Myers et al. Prog Cardiovasc Dis 2017;60:21–29; error 7.2 mL/kg/min';
export const friend2018Source =
  'FRIEND 2018: de Souza e Silva et al. Eur J Prev Cardiol 2018;25:742–750; error 6.6 mL/kg/min';

/**
 * Predicted peak uptake of healthy adults on the treadmill: 79.9 − 0.39 age − 13.7 sex (man 0, woman 1) − 0.127 pounds.
 * @returns mL/kg/min, not rounded; the equation takes pounds, which are made here
 * @see friend2017Source
 */
export const friend2017Vo2 = ({ ageYears, sexAtBirth, weight }: CapacityFacts): Vo2 =>
  vo2(79.9 - 0.39 * ageYears - (sexAtBirth === 'female' ? 13.7 : 0) - 0.127 * poundsOf(weight));

/**
 * The same for treadmill or cycle: 45.2 − 0.35 age − 10.9 sex (man 1, woman 2) − 0.15 pounds + 0.68 inches − 0.46 mode
 * (treadmill 1, cycle 2).
 * @returns mL/kg/min, not rounded
 * @see friend2018Source
 */
export const friend2018Vo2 = (
  { ageYears, sexAtBirth, weight }: CapacityFacts,
  height: Centimeters,
  mode: 'treadmill' | 'cycle',
): Vo2 =>
  vo2(
    45.2 -
      0.35 * ageYears -
      10.9 * (sexAtBirth === 'male' ? 1 : 2) -
      0.15 * poundsOf(weight) +
      0.68 * inchesOf(height) -
      0.46 * (mode === 'treadmill' ? 1 : 2),
  );

/** A peak as percent of the predicted one; null where the prediction is not above 0 (very old and heavy). */
export const percentOfPredicted = (peak: Vo2, predicted: Vo2): number | null =>
  predicted > 0 ? (100 * peak) / predicted : null;
