import type { RiskLevel } from '../prescribing/request';
import type { RiskClass } from './criteria';
import type { Stratification } from './stratify';

/** A clinician's own class, with the reason. */
export interface RiskOverride {
  readonly riskClass: RiskClass;
  readonly reason: string;
}

/** Why an override does not stand; null when it does. What is missing cannot be overridden into low. */
export function whyNotOverride(
  { missing, treatAs }: Stratification,
  { riskClass, reason }: RiskOverride,
): string | null {
  if (reason.trim() === '') return 'Give the reason for another class.';
  if (riskClass === treatAs && missing.length === 0) return 'This is the class by the criteria.';
  return riskClass === 'low' && missing.length > 0
    ? 'Low only when every criterion is known: fill in what is missing.'
    : null;
}

/**
 * The level that a prescription is given: the override when there is one that stands, else the class, and `unknown` while it is
 * undetermined, which the rules read as high.
 */
export function riskLevelOf(
  stratification: Stratification,
  override: RiskOverride | null,
): RiskLevel {
  if (override !== null && whyNotOverride(stratification, override) === null) {
    return override.riskClass;
  }
  const { riskClass } = stratification;
  return riskClass === 'undetermined' ? 'unknown' : riskClass;
}
