import type { Bpm } from '../units';
import { bpm } from '../units';

/**
 * Rate at a fraction of heart-rate reserve: resting + fraction × (maximum − resting).
 * @param resting seated resting rate, bpm, below `maximum`
 * @param maximum peak rate measured on today's drugs, or an estimate, bpm
 * @param fraction 0–1
 * @returns bpm, not rounded; where `maximum` is not above `resting` the result falls with the fraction
 * @see Karvonen, Kentala, Mustala. Ann Med Exp Biol Fenn 1957;35:307–315; worked in J Clin Med 2021;10:3071, Table 3
 */
export function rateAtReserve(resting: Bpm, maximum: Bpm, fraction: number): Bpm {
  return bpm(resting + fraction * (maximum - resting));
}

/**
 * Fraction of heart-rate reserve at which a rate lies; below 0 or above 1 outside resting and maximum, never clipped.
 * @throws RangeError when `maximum` equals `resting`: the fraction is then undefined
 */
export function fractionOfReserve(resting: Bpm, maximum: Bpm, rate: number): number {
  if (maximum === resting) throw new RangeError('heart-rate reserve: maximum equals resting');
  return (rate - resting) / (maximum - resting);
}

/**
 * Rate at a fraction of a measured peak rate.
 * @param peak measured on today's drugs, bpm
 * @param fraction 0–1; bands of the peak rate differ from those of the reserve
 * @returns bpm, not rounded
 * @see Garber et al., ACSM position stand. Med Sci Sports Exerc 2011;43:1334–1359
 */
export function rateAtPeakFraction(peak: Bpm, fraction: number): Bpm {
  return bpm(fraction * peak);
}
