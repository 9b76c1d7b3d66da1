import type { Minutes, Mets, Range } from '../../units';
import { mets, metsOf, toMillionths, vo2Of } from '../../units';
import { rateAtReserve } from '../heart-rate-reserve';
import { fractionOfVo2Reserve, vo2AtReserve } from '../oxygen-uptake-reserve';
import type {
  ExertionRange,
  FractionRange,
  HeartRateRange,
  PrescriptionAnswer,
  PrescriptionPolicy,
  PrescriptionRequest,
} from '../prescribing';
import { acceptedPeak } from '../prescribing/accepted-peak';
import { exertionOfFractions } from '../prescribing/effort';
import { cutAtCeiling, ifWideEnough, roundInward } from '../prescribing/range';
import type { IntervalPolicy } from './interval-policy';

/** What somebody wishes to prescribe. */
export interface IntervalPlan {
  readonly repeats: number;
  readonly workMinutes: Minutes;
  readonly recoveryMinutes: Minutes;
  /** Fractions of reserve of the work bouts. */
  readonly work: FractionRange;
}

/** The prescription beside which the intervals stand. */
export interface IntervalBasis {
  readonly request: PrescriptionRequest;
  readonly answer: PrescriptionAnswer;
  readonly policy: PrescriptionPolicy;
}

export interface IntervalPrescription {
  /** Short bouts, and all where heart rate does not lead, go by work and effort. */
  readonly leadBy: 'heart-rate' | 'work-and-effort';
  readonly work: FractionRange;
  /** Null where the bouts do not go by heart rate. */
  readonly target: HeartRateRange | null;
  /** Null without a peak on which work may be based. */
  readonly workMets: Range<Mets> | null;
  readonly recoveryMets: Mets | null;
  readonly effort: ExertionRange;
  readonly warmUpMinutes: number;
  readonly totalMinutes: number;
  /** Why a physician must sign; [] when staff may. */
  readonly physicianSigns: readonly string[];
}

export type IntervalResult =
  | { readonly ok: true; readonly prescription: IntervalPrescription }
  | { readonly ok: false; readonly why: readonly string[] };

function planFaults({ repeats, workMinutes, recoveryMinutes, work }: IntervalPlan): string[] {
  return [
    ...(Number.isInteger(repeats) && repeats >= 1 && repeats <= 60
      ? []
      : ['Give 1 to 60 work bouts.']),
    ...(workMinutes > 0 && recoveryMinutes > 0 ? [] : ['Give both bouts a length.']),
    ...(work.lower > 0 && work.lower < work.upper
      ? []
      : ['The lower intensity must be below the upper.']),
  ];
}

/** Why there are no intervals for this patient now. */
function refusals(
  { request, answer }: IntervalBasis,
  plan: IntervalPlan,
  policy: IntervalPolicy,
): string[] {
  const { conditions, programWeek } = request;
  const refused: readonly (readonly [boolean, string])[] = [
    [conditions.pulmonaryHypertension, 'No intervals with pulmonary hypertension.'],
    [
      conditions.ventricularAssistDevice,
      'No intervals with an assist device: effort stays at 11–13.',
    ],
    [
      answer.cautions.some(({ severity }) => severity === 'stop'),
      'A caution says stop: settle it first.',
    ],
    [
      answer.cautions.some(({ code }) => code === 'work-ceiling-unknown'),
      'A threshold is known but not the work at which it comes: no work is prescribed.',
    ],
    [
      programWeek < policy.firstProgramWeek,
      `Intervals begin in program week ${policy.firstProgramWeek}.`,
    ],
    [
      plan.work.upper > policy.highestFraction,
      `Work bouts stay at or under ${policy.highestFraction} of reserve.`,
    ],
    [
      plan.workMinutes > policy.longestWorkMinutes,
      `Work bouts last at most ${policy.longestWorkMinutes} minutes.`,
    ],
  ];
  return refused.flatMap(([isRefused, why]) => (isRefused ? [why] : []));
}

/** The upper fraction that both ceilings leave; null where a ceiling is known but not which fraction reaches it. */
function underCeilings({ work }: IntervalPlan, basis: IntervalBasis): number | null {
  const { request, answer, policy } = basis;
  const { ceiling, intensityAtCeiling, workCeilingMets } = answer;
  if (ceiling !== null && intensityAtCeiling === null) return null;
  const underRate = Math.min(work.upper, intensityAtCeiling ?? work.upper);
  if (workCeilingMets === null) return underRate;
  const peak = acceptedPeak(request.test, policy);
  const left = peak && fractionOfVo2Reserve(peak.vo2, vo2Of(workCeilingMets));
  return left === null ? null : Math.min(underRate, left);
}

function workOf(
  { request, answer, policy }: IntervalBasis,
  { lower, upper }: FractionRange,
): Range<Mets> | null {
  const peak = acceptedPeak(request.test, policy);
  if (peak === null) return null;
  const most = metsOf(vo2AtReserve(peak.vo2, upper));
  const cut = answer.workCeilingMets === null ? most : Math.min(most, answer.workCeilingMets);
  const least = metsOf(vo2AtReserve(peak.vo2, lower));
  return { lower: mets(Math.min(least, cut)), upper: mets(cut) };
}

/** The rates of work bouts that are long enough to be read; null where heart rate does not lead by reserve. */
function rateOf(
  { request, answer, policy }: IntervalBasis,
  { lower, upper }: FractionRange,
): HeartRateRange | null {
  const { leadBy, maximum, ceiling } = answer;
  if (leadBy !== 'heart-rate' || maximum === null) return null;
  const { seated } = request.resting;
  const range = roundInward({
    lower: rateAtReserve(seated, maximum.value, lower),
    upper: rateAtReserve(seated, maximum.value, upper),
  });
  return ifWideEnough(cutAtCeiling(range, ceiling), policy);
}

const recoveryOf = (basis: IntervalBasis, fraction: number): Mets | null =>
  workOf(basis, { lower: 0, upper: fraction })?.upper ?? null;

function signatures(
  { request, answer, policy: basisPolicy }: IntervalBasis,
  plan: IntervalPlan,
  policy: IntervalPolicy,
): string[] {
  const asked: readonly (readonly [boolean, string])[] = [
    [
      toMillionths(plan.work.upper - policy.physicianAbove) > 0,
      `above ${policy.physicianAbove} of reserve`,
    ],
    [request.risk === 'high' || request.risk === 'unknown', 'the risk is high or not known'],
    [request.conditions.transplant === 'denervated', 'a transplanted heart'],
    [acceptedPeak(request.test, basisPolicy) === null, 'no test to base the work on'],
    [answer.maximum !== null && answer.maximum.method !== 'measured', 'the maximum is an estimate'],
  ];
  return asked.flatMap(([isAsked, why]) => (isAsked ? [why] : []));
}

const whyNothingLeft = (plan: IntervalPlan, basis: IntervalBasis): string =>
  underCeilings(plan, basis) === null
    ? 'A ceiling is known but not which intensity reaches it: no intervals without a usable test.'
    : 'The ceiling lies below the work bouts: nothing is left to work in.';

/**
 * Intervals beside a prescription, under a policy of their own. The ceilings of the prescription hold: a heart-rate ceiling cuts the
 * upper fraction, a work ceiling the work. Bouts under two minutes go by work and effort, since the rate lags behind.
 */
export function prescribeIntervals(
  plan: IntervalPlan,
  basis: IntervalBasis,
  policy: IntervalPolicy,
): IntervalResult {
  const faults = [...planFaults(plan), ...refusals(basis, plan, policy)];
  const upper = underCeilings(plan, basis) ?? 0;
  if (toMillionths(upper - plan.work.lower) <= 0) faults.push(whyNothingLeft(plan, basis));
  const work = { lower: plan.work.lower, upper };
  const workMets = workOf(basis, work);
  const isShort = plan.workMinutes < policy.shortBoutMinutes;
  if (isShort && workMets === null) {
    faults.push(
      'Short bouts go by work, and no peak is there to base it on: make the bouts longer.',
    );
  }
  if (faults.length > 0) return { ok: false, why: faults };
  const target = isShort ? null : rateOf(basis, work);
  const effort = exertionOfFractions(work.lower, upper);
  return {
    ok: true,
    prescription: {
      leadBy: target === null ? 'work-and-effort' : 'heart-rate',
      work,
      target,
      workMets,
      recoveryMets: recoveryOf(basis, policy.recoveryHighest),
      effort: {
        lower: Math.min(effort.lower, policy.highestEffort),
        upper: Math.min(effort.upper, policy.highestEffort),
      },
      warmUpMinutes: policy.warmUpMinutes,
      totalMinutes: plan.repeats * (plan.workMinutes + plan.recoveryMinutes),
      physicianSigns: signatures(basis, plan, policy),
    },
  };
}
