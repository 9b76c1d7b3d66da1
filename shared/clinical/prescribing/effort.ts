import type { Mets } from '../../units';
import { toMillionths } from '../../units';
import type { Decision } from './decision';
import type { PrescriptionAnswer } from './answer';
import type { Findings } from './findings';
import { underRateCeiling, underWorkCeiling } from './work-target';

type Exertion = PrescriptionAnswer['perceivedExertion'];

const scale = 'borg-6-20';
const light: Exertion = { scale, lower: 9, upper: 11 };
const fairlyLight: Exertion = { scale, lower: 11, upper: 13 };
const denervated: Exertion = { scale, lower: 12, upper: 14 };

/** Lower end of effort for a lower fraction of reserve. */
function lowerEnd(fraction: number): number {
  if (fraction < 0.4) return 9;
  return fraction < 0.6 ? 11 : 14;
}

/** Upper end of effort for the upper fraction of reserve that is left. */
function upperEnd(fraction: number): number {
  if (fraction <= 0.6) return 13;
  if (fraction <= 0.7) return 14;
  return fraction <= 0.8 ? 16 : 17;
}

/** Effort that matches fractions of reserve (ACSM bands, Garber 2011). */
export function exertionOfFractions(lower: number, upper: number): Exertion {
  const highest = upperEnd(upper);
  // An upper fraction of exactly 0.60 would put the lower end above the upper: the more restrictive wins.
  return { scale, lower: Math.min(lowerEnd(lower), highest), upper: highest };
}

/** Effort that matches the fractions of reserve left under both ceilings. */
function matching(findings: Findings, workCeiling: Mets | null): Exertion {
  const { lower, upper } = findings.intensity;
  const left = toMillionths(
    underWorkCeiling(underRateCeiling(upper, findings), findings, workCeiling),
  );
  if (left < toMillionths(lower)) return light;
  return exertionOfFractions(lower, left);
}

/** Perceived exertion, Borg 6–20: the first rule that applies. */
export function exertionOf(
  findings: Findings,
  { method, reasons }: Decision,
  workCeiling: Mets | null,
): Exertion {
  const { conditions } = findings.request;
  if (reasons.includes('no-valid-range')) return light;
  if (conditions.ventricularAssistDevice || conditions.pulmonaryHypertension) return fairlyLight;
  if (conditions.transplant === 'denervated') return denervated;
  const cannotLeadButHasPeak = findings.blocks.length > 0 && findings.peak !== null;
  return method === 'heart-rate-reserve' || cannotLeadButHasPeak
    ? matching(findings, workCeiling)
    : fairlyLight;
}
