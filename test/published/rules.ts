import { defaultPolicy, effectOfFact } from '@shared/clinical/prescribing';
import type { PrescriptionPolicy } from '@shared/clinical/prescribing';
import { bpm } from '@shared/units';
import { expect } from 'vitest';
import {
  answerTo,
  withTest,
  withoutTest,
  withoutThresholds,
} from '../builders/prescription-request';
import type { Change } from '../builders/prescription-request';
import { input } from './vectors';
import type { Vector } from './vectors';

const withMargins = (margin: Partial<PrescriptionPolicy['margin']>): PrescriptionPolicy => ({
  ...defaultPolicy,
  margin: { ...defaultPolicy.margin, ...margin },
});

const ischemiaOf =
  (vector: Vector): Change =>
  (i) => {
    i.resting.seated = input(vector, 'rest');
    i.thresholds = [{ kind: 'ischemia', heartRate: input(vector, 'ischaemicHR'), clearMets: null }];
  };

const peakOf = (vector: Vector) => withTest({ peakHeartRate: input(vector, 'peak') });

const icdZones =
  (...zones: { rate: number; kind: 'monitor' | 'shock' }[]): Change =>
  (i) =>
    (i.devices.icd = { status: 'present', zones });

const standing =
  (vector: Vector): Change =>
  (i) =>
    (i.resting.standing = input(vector, 'restStanding'));

const noRateLeads = (change: Change) => {
  const answer = answerTo(change);
  expect(answer).toMatchObject({ leadBy: 'perceived-exertion', target: null });
  return answer.perceivedExertion;
};

/** Vectors that state what a prescription must come to: each is put to the engine. */
export const rules: Readonly<Record<string, (vector: Vector) => void>> = {
  'RX-NOTEST-20': (vector) => {
    const { guide } = answerTo([withoutTest, withoutThresholds, standing(vector)]);
    expect(guide?.lower).toBe(vector.expected);
  },
  'RX-NOTEST-30': (vector) => {
    const { guide } = answerTo([withoutTest, withoutThresholds, standing(vector)]);
    expect(guide?.upper).toBe(vector.expected);
  },
  'RX-ISCH-10': (vector) => {
    const answer = answerTo([ischemiaOf(vector), peakOf(vector)]);
    expect(answer.candidates[0]?.upper).toBe(123);
    expect(answer.target?.upper).toBe(vector.expected);
  },
  'RX-ISCH-LOW': (vector) => {
    const answer = answerTo([ischemiaOf(vector), peakOf(vector)]);
    expect(answer.candidates[0]?.lower).toBe(94);
    expect(answer).toMatchObject({
      ceiling: { value: 90 },
      target: null,
      reasons: ['no-valid-range'],
    });
  },
  'RX-ICD-20': (vector) => {
    const zone = icdZones({ rate: input(vector, 'detectionRate'), kind: 'shock' });
    const answer = answerTo([withoutThresholds, zone], withMargins({ icd: bpm(20) }));
    expect(answer.ceiling?.value).toBe(vector.expected);
  },
  'RX-ICD-MON': () => {
    const zones = icdZones({ rate: 140, kind: 'monitor' }, { rate: 170, kind: 'shock' });
    const ceilings = [10, 20].map(
      (icd) => answerTo([withoutThresholds, zones], withMargins({ icd: bpm(icd) })).ceiling?.value,
    );
    expect(ceilings).toEqual([130, 120]);
  },
  'RX-MULTI': (vector) => {
    const answer = answerTo(
      [
        (i) => {
          const heartRate = input(vector, 'ischaemicHR');
          i.thresholds = [{ kind: 'ischemia', heartRate, clearMets: null }];
        },
        icdZones({ rate: input(vector, 'icdDetection'), kind: 'shock' }),
      ],
      withMargins({ icd: bpm(20) }),
    );
    expect(answer.ceiling).toEqual({ value: vector.expected, bindingLimits: ['ischemia', 'icd'] });
  },
  'RX-BB-STALE': () => {
    expect(effectOfFact('rate-acting-drug-raised').effect).toBe('withdrawn');
    const effort = noRateLeads(withTest({ sameRateActingDrugs: false }));
    expect(effort.lower).toBeGreaterThanOrEqual(11);
    expect(effort.upper).toBeLessThanOrEqual(14);
  },
  'RX-TX': () => {
    const effort = noRateLeads((i) => (i.conditions.transplant = 'denervated'));
    expect(effort).toMatchObject({ lower: 12, upper: 14 });
  },
  'RX-AF': () => {
    noRateLeads((i) => (i.rhythm = 'atrial-fibrillation'));
  },
  'RX-PPM-FIX': () => {
    noRateLeads((i) => (i.rhythm = 'fixed-paced'));
  },
  'RX-PPM-URL': (vector) => {
    const tracking: Change = (i) =>
      (i.devices.upperTrackingRate = input(vector, 'upperTrackingRate'));
    const policy = withMargins({ tracking: bpm(input(vector, 'margin')) });
    const answer = answerTo([withoutThresholds, tracking], policy);
    expect(answer.ceiling?.value).toBe(vector.expected);
  },
};
