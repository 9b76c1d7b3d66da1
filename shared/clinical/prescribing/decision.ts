import type { Bpm } from '../../units';
import type { Maximum, ReasonCode } from './answer';
import type { Findings } from './findings';
import type { Option } from './options';
import { cutAtCeiling, ifWideEnough, roundInward } from './range';
import type { HeartRateRange, Method } from './request';
import { guideOf } from './resting-plus';

/** What leads, and in which range. */
export interface Decision {
  /** What made the target; perceived-exertion when effort leads. */
  readonly method: Method;
  readonly maximum: Maximum | null;
  readonly target: HeartRateRange | null;
  readonly guide: HeartRateRange | null;
  readonly reasons: readonly ReasonCode[];
  /** The upper end of the leading method, before rounding and before the ceiling; null when effort leads. */
  readonly upperBound: Bpm | null;
  /** Whether the ceiling cut the range, or left none. */
  readonly cutByCeiling: boolean;
}

function effortLeads(
  reasons: readonly ReasonCode[],
  guide: HeartRateRange | null,
  cutByCeiling: boolean,
): Decision {
  const method = 'perceived-exertion';
  return { method, maximum: null, target: null, guide, reasons, upperBound: null, cutByCeiling };
}

/** Whether the rules, left alone, would have had a heart rate to propose. */
const hasProposal = (options: readonly Option[]): boolean =>
  options.some(
    ({ method, maximumMethod, applicable }) =>
      applicable &&
      (method === 'observed-work' ||
        (method === 'heart-rate-reserve' && maximumMethod === 'measured')),
  );

function effortReasons(findings: Findings, options: readonly Option[]): ReasonCode[] {
  const reasons = [...findings.blocks];
  if (reasons.length === 0 && !hasProposal(options)) reasons.push('no-usable-test');
  if (findings.request.choice.method === 'perceived-exertion') reasons.push('chosen');
  return reasons;
}

/** The target of the option taken; where there is none, effort leads and the reasons say why. */
export function decide(
  findings: Findings,
  options: readonly Option[],
  { method, maximum, range }: Option,
): Decision {
  const { ceiling, policy } = findings;
  if (range === null) {
    return effortLeads(effortReasons(findings, options), guideOf(findings), false);
  }
  const whole = roundInward(range);
  const under = cutAtCeiling(whole, ceiling);
  const cutByCeiling = under.upper < whole.upper;
  const target = ifWideEnough(under, policy);
  if (target === null) return effortLeads(['no-valid-range'], null, cutByCeiling);
  const upperBound = range.upper;
  return { method, maximum, target, guide: null, reasons: [], upperBound, cutByCeiling };
}
