import type { Centimeters, Kilograms, Meters } from '../units';
import { meters } from '../units';
import type { KnownSex } from './known-sex';

/** What the prediction of a walk rests on. */
export interface WalkerFacts {
  readonly ageYears: number;
  readonly sexAtBirth: KnownSex;
  readonly height: Centimeters;
  readonly weight: Kilograms;
}

export const walkPredictionSource =
  'Enright, Sherrill. Am J Respir Crit Care Med 1998;158:1384–1387 (40–80 years; lower limit of normal from memory)';

/** Ages of the people whom the equation describes, years, ends included. */
export const walkPredictionAges = { lowest: 40, highest: 80 } as const;

/** How far below the prediction a walk is still normal, m; from memory. */
const belowPrediction = { male: 153, female: 139 } as const;

/**
 * Predicted six-minute walk of a healthy adult: men 7.57 cm − 5.02 age − 1.76 kg − 309, women
 * 2.11 cm − 2.29 kg − 5.78 age + 667. It explains about 40 % of the scatter.
 * @returns m, not rounded; valid for 40–80 years (`walkPredictionAges`)
 * @see Enright, Sherrill. Am J Respir Crit Care Med 1998;158:1384–1387
 */
export function predictedWalk({ ageYears, sexAtBirth, height, weight }: WalkerFacts): Meters {
  return meters(
    sexAtBirth === 'male'
      ? 7.57 * height - 5.02 * ageYears - 1.76 * weight - 309
      : 2.11 * height - 2.29 * weight - 5.78 * ageYears + 667,
  );
}

/**
 * The same authors' form by body mass index: men 1140 − 5.61 BMI − 6.94 age, women 1017 − 6.24 BMI − 5.83 age. From memory;
 * a review prints the men's intercept as 1.140, with a point for thousands.
 * @param bodyMassIndex kg/m²
 */
export const predictedWalkByIndex = (
  bodyMassIndex: number,
  ageYears: number,
  sexAtBirth: KnownSex,
): Meters =>
  meters(
    sexAtBirth === 'male'
      ? 1140 - 5.61 * bodyMassIndex - 6.94 * ageYears
      : 1017 - 6.24 * bodyMassIndex - 5.83 * ageYears,
  );

/** The shortest walk that is still normal, m, not rounded: the prediction less 153 (men) or 139 (women). */
export const lowerLimitOfWalk = (facts: WalkerFacts): Meters =>
  meters(predictedWalk(facts) - belowPrediction[facts.sexAtBirth]);
