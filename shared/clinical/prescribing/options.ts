import type { Bpm, Range } from '../../units';
import { bpm } from '../../units';
import { rateAtPeakFraction, rateAtReserve } from '../heart-rate-reserve';
import type { Candidate, Maximum } from './answer';
import { reasonWords } from './can-lead';
import type { Findings } from './findings';
import { maximumOf } from './maxima';
import { roundInward } from './range';
import type { MaximumMethod, Method, ObservedWork } from './request';
import { restingPlusRange, whyNotRestingPlus } from './resting-plus';

/** A method, with its maximum where it takes one, as it stands for this patient. */
export interface Option {
  readonly method: Method;
  readonly maximumMethod: MaximumMethod | null;
  readonly applicable: boolean;
  readonly why: string;
  /** Null when not applicable or without a maximum. */
  readonly maximum: Maximum | null;
  /** Before rounding and before the ceiling; null when not applicable or without a range. */
  readonly range: Range<Bpm> | null;
}

/** In the order in which an answer lists the candidates. */
const reserveMaxima = [
  'measured',
  'brawner',
  'keteyian',
  'tanaka',
  'gellish',
  'nes',
  'fox',
  'gulati',
] as const satisfies readonly MaximumMethod[];

/** Observed work counts from this many sessions, at an effort within these numbers of the Borg 6–20 scale. */
const observed = { sessions: 2, effort: { lower: 9, upper: 13 }, halfWidth: 5 };

const notApplicable = (
  method: Method,
  maximumMethod: MaximumMethod | null,
  why: string,
): Option => ({ method, maximumMethod, applicable: false, why, maximum: null, range: null });

const withoutMaximum = (method: Method, why: string, range: Range<Bpm> | null): Option => ({
  method,
  maximumMethod: null,
  applicable: true,
  why,
  maximum: null,
  range,
});

/** A method on a maximum; `at` gives the ends of its range from the maximum. */
function onMaximum(
  method: Method,
  maximumMethod: MaximumMethod,
  findings: Findings,
  at: (maximum: Bpm) => Range<Bpm>,
): Option {
  const found = maximumOf(maximumMethod, findings);
  if (!found.applicable) return notApplicable(method, maximumMethod, found.why);
  const { value, standardError, why } = found;
  const maximum = { method: maximumMethod, value, standardError };
  return { method, maximumMethod, applicable: true, why, maximum, range: at(value) };
}

const reserveOption = (maximumMethod: MaximumMethod, findings: Findings): Option => {
  const { intensity, request } = findings;
  const { seated } = request.resting;
  return onMaximum('heart-rate-reserve', maximumMethod, findings, (maximum) => ({
    lower: rateAtReserve(seated, maximum, intensity.lower),
    upper: rateAtReserve(seated, maximum, intensity.upper),
  }));
};

const percentOfPeakOption = (findings: Findings): Option => {
  const { lower, upper } = findings.request.percentOfPeak ?? findings.policy.percentOfPeak;
  return onMaximum('percent-of-peak', 'measured', findings, (peak) => ({
    lower: rateAtPeakFraction(peak, lower),
    upper: rateAtPeakFraction(peak, upper),
  }));
};

function whyNotObserved({ sessions, perceivedExertion }: ObservedWork): string | null {
  if (sessions < observed.sessions) return `Fewer than ${observed.sessions} sessions observed.`;
  const { lower, upper } = observed.effort;
  return perceivedExertion.lower < lower || perceivedExertion.upper > upper
    ? `Effort was not within ${lower}–${upper}.`
    : null;
}

function observedWorkOption({ request: { observedWork } }: Findings): Option {
  const method = 'observed-work';
  if (observedWork === null) {
    return notApplicable(method, null, "No steady work has been observed on today's drugs.");
  }
  const whyNot = whyNotObserved(observedWork);
  if (whyNot !== null) return notApplicable(method, null, whyNot);
  const median = observedWork.medianHeartRate;
  return withoutMaximum(method, 'Median rate at steady work, 5 to each side.', {
    lower: bpm(median - observed.halfWidth),
    upper: bpm(median + observed.halfWidth),
  });
}

function restingPlusOption({ request, policy }: Findings): Option {
  const whyNot = whyNotRestingPlus(request);
  if (whyNot !== null) return notApplicable('resting-plus', null, whyNot);
  const why = 'A starting guide for the first weeks, known to under-dose.';
  return withoutMaximum('resting-plus', why, restingPlusRange(request, policy));
}

/** Every method and maximum in the order of an answer's candidates. */
export function optionsOf(findings: Findings): Option[] {
  const options = [
    ...reserveMaxima.map((maximum) => reserveOption(maximum, findings)),
    percentOfPeakOption(findings),
    observedWorkOption(findings),
    restingPlusOption(findings),
  ];
  const effort = withoutMaximum('perceived-exertion', 'Effort always applies.', null);
  const [block] = findings.blocks;
  if (block === undefined) return [...options, effort];
  const why = `Heart rate cannot lead: ${reasonWords[block]}.`;
  const blocked = options.map(({ method, maximumMethod }) =>
    notApplicable(method, maximumMethod, why),
  );
  return [...blocked, effort];
}

/** An option as an answer shows it: whole rates, an inverted pair as none. */
export function candidateOf(option: Option): Candidate {
  const range = option.range && roundInward(option.range);
  const shown = range !== null && range.lower <= range.upper ? range : null;
  return {
    method: option.method,
    maximum: option.maximumMethod,
    maximumValue: option.maximum?.value ?? null,
    standardError: option.maximum?.standardError ?? null,
    lower: shown?.lower ?? null,
    upper: shown?.upper ?? null,
    applicable: option.applicable,
    why: option.why,
  };
}
