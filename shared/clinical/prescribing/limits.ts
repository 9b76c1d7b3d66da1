import { bpm } from '../../units';
import type { Bpm } from '../../units';
import { fractionOfReserve } from '../heart-rate-reserve';
import type { Ceiling, Limit, LimitKind } from './answer';
import { limitKinds } from './answer';
import { marginKeyOf } from './policy';
import type { PrescriptionPolicy } from './policy';
import type { ExerciseTest, PrescriptionRequest } from './request';

/** What each limit stays below, and who says so. */
const origin: Readonly<Record<LimitKind, { readonly below: string; readonly source: string }>> = {
  ischemia: {
    below: 'the ischemic threshold',
    source: 'ACSM guidelines: 10 below the onset of ischemia',
  },
  angina: {
    below: 'the angina threshold',
    source: 'ACSM guidelines: angina with exercise counts as ischemia',
  },
  arrhythmia: {
    below: 'the rate at which arrhythmia began',
    source: 'ACSM guidelines, as for ischemia',
  },
  'blood-pressure': {
    below: 'the rate at which blood pressure responded abnormally',
    source: 'ACSM guidelines, as for ischemia',
  },
  symptom: {
    below: 'the rate at which symptoms began',
    source: 'ACSM guidelines, as for ischemia',
  },
  icd: {
    below: 'the lowest ICD zone of any kind',
    source:
      'U.S. texts 10–15 below detection; European position paper (Eur Heart J 2010;31:1967) 20',
  },
  tracking: {
    below: 'the upper tracking rate',
    source: 'Common practice, from memory: confirm with the device clinic',
  },
};

function limitOf(kind: LimitKind, threshold: Bpm, margin: Bpm): Limit {
  const { below, source } = origin[kind];
  return {
    kind,
    threshold,
    margin,
    value: bpm(Math.floor(threshold - margin)),
    rule: `${margin} below ${below}`,
    source,
  };
}

/** One row a threshold, one for the lowest ICD zone, one for the tracking rate, in the order of their kinds. */
export function limitsOf(request: PrescriptionRequest, policy: PrescriptionPolicy): Limit[] {
  const { icd, upperTrackingRate } = request.devices;
  const limits = request.thresholds.map(({ kind, heartRate }) =>
    limitOf(kind, heartRate, policy.margin[marginKeyOf[kind]]),
  );
  limits.sort((a, b) => limitKinds.indexOf(a.kind) - limitKinds.indexOf(b.kind));
  if (icd.zones.length > 0) {
    const lowest = bpm(Math.min(...icd.zones.map(({ rate }) => rate)));
    limits.push(limitOf('icd', lowest, policy.margin.icd));
  }
  if (upperTrackingRate !== null) {
    limits.push(limitOf('tracking', upperTrackingRate, policy.margin.tracking));
  }
  return limits;
}

/** The lowest limit and every kind that ties on it; null when there is no limit. */
export function ceilingOf(limits: readonly Limit[]): Ceiling | null {
  if (limits.length === 0) return null;
  const value = bpm(Math.min(...limits.map((limit) => limit.value)));
  const binding = limits.filter((limit) => limit.value === value).map(({ kind }) => kind);
  return { value, bindingLimits: [...new Set(binding)] };
}

/** Fraction of the measured reserve that the ceiling leaves; null without a usable test or a ceiling. */
export function intensityAtCeiling(
  seated: Bpm,
  ceiling: Ceiling | null,
  usableTest: ExerciseTest | null,
): number | null {
  if (ceiling === null || usableTest === null) return null;
  return fractionOfReserve(seated, usableTest.peakHeartRate, ceiling.value);
}
