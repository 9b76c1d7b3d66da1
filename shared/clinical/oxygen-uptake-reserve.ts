import type { Vo2 } from '../units';
import { restingVo2, vo2 } from '../units';

/**
 * Oxygen uptake at a fraction of its reserve: 3.5 + fraction × (peak − 3.5).
 * @param peak gross peak uptake, mL/kg/min, above 3.5
 * @param fraction not clamped: below 0 or above 1 lies outside rest and peak
 * @returns mL/kg/min, not rounded
 * @see Swain, Leutholtz. Med Sci Sports Exerc 1997;29:410–414 (the fraction of heart-rate reserve matches it)
 */
export function vo2AtReserve(peak: Vo2, fraction: number): Vo2 {
  return vo2(restingVo2 + fraction * (peak - restingVo2));
}

/** Fraction of the uptake reserve; null when the peak is not above rest and there is no reserve. */
export function fractionOfVo2Reserve(peak: Vo2, uptake: Vo2): number | null {
  return peak > restingVo2 ? (uptake - restingVo2) / (peak - restingVo2) : null;
}
