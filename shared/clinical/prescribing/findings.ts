import type { ExerciseTest, FractionRange, PrescriptionRequest } from './request';
import type { AcceptedPeak } from './accepted-peak';
import { acceptedPeak } from './accepted-peak';
import type { Ceiling, Limit, ReasonCode } from './answer';
import { intensityOf } from './intensity';
import { ceilingOf, intensityAtCeiling, limitsOf } from './limits';
import type { PrescriptionPolicy } from './policy';
import { leadBlocks } from './can-lead';
import { findTest } from './usable-test';
import type { TestFinding } from './usable-test';

/** What the request says by itself, before a method is chosen. */
export interface Findings {
  readonly request: PrescriptionRequest;
  readonly policy: PrescriptionPolicy;
  readonly test: TestFinding;
  /** The test, when it is usable for heart rates. */
  readonly usableTest: ExerciseTest | null;
  /** The peak on which work may be based. */
  readonly peak: AcceptedPeak | null;
  /** Why heart rate cannot lead; [] when it can. */
  readonly blocks: readonly ReasonCode[];
  readonly limits: readonly Limit[];
  readonly ceiling: Ceiling | null;
  readonly intensity: FractionRange;
  readonly intensityAtCeiling: number | null;
}

export function findingsOf(request: PrescriptionRequest, policy: PrescriptionPolicy): Findings {
  const test = findTest(request.test, policy);
  const usableTest = test.usable ? test.test : null;
  const peak = acceptedPeak(request.test, policy);
  const limits = limitsOf(request, policy);
  const ceiling = ceilingOf(limits);
  return {
    request,
    policy,
    test,
    usableTest,
    peak,
    blocks: leadBlocks(request, policy, usableTest),
    limits,
    ceiling,
    intensity: intensityOf(request, policy, peak),
    intensityAtCeiling: intensityAtCeiling(request.resting.seated, ceiling, usableTest),
  };
}
