import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withTest,
  withoutTest,
  withoutThresholds,
} from '../../../test/builders/prescription-request';
import { bpm } from '../../units';
import { defaultPolicy } from './policy';

describe('limits and ceiling', () => {
  it('has one row a threshold, then the lowest ICD zone, then the tracking rate', () => {
    const { limits } = answerTo((input) => {
      input.thresholds = [
        { kind: 'symptom', heartRate: 125, clearMets: null },
        { kind: 'ischemia', heartRate: 130.7, clearMets: null },
        { kind: 'blood-pressure', heartRate: 126, clearMets: null },
        { kind: 'angina', heartRate: 122, clearMets: null },
        { kind: 'ischemia', heartRate: 118, clearMets: null },
        { kind: 'arrhythmia', heartRate: 129, clearMets: null },
      ];
      input.devices = {
        icd: {
          status: 'present',
          zones: [
            { rate: 170, kind: 'shock' },
            { rate: 140, kind: 'monitor' },
          ],
        },
        upperTrackingRate: 150,
      };
    });
    expect(limits.map(({ kind, threshold, value }) => [kind, threshold, value])).toEqual([
      ['ischemia', 130.7, 120],
      ['ischemia', 118, 108],
      ['angina', 122, 112],
      ['arrhythmia', 129, 119],
      ['blood-pressure', 126, 116],
      ['symptom', 125, 115],
      ['icd', 140, 130],
      ['tracking', 150, 140],
    ]);
    expect(limits.every(({ rule, source }) => rule.length > 0 && source.length > 0)).toBe(true);
  });

  it('takes each margin from the policy', () => {
    const margin = { ...defaultPolicy.margin, bloodPressure: bpm(20) };
    const answer = answerTo(
      (input) => (input.thresholds = [{ kind: 'blood-pressure', heartRate: 130, clearMets: null }]),
      { ...defaultPolicy, margin },
    );
    expect(answer.limits[0]).toMatchObject({ margin: 20, value: 110 });
    expect(answer.limits[0]?.rule).toContain('20 below');
  });

  it('names every kind that ties on the floored value, once', () => {
    const { ceiling } = answerTo((input) => {
      input.thresholds = [
        { kind: 'angina', heartRate: 120.9, clearMets: null },
        { kind: 'ischemia', heartRate: 120.2, clearMets: null },
        { kind: 'ischemia', heartRate: 120, clearMets: null },
      ];
      input.devices.upperTrackingRate = 120;
    });
    expect(ceiling).toEqual({ value: 110, bindingLimits: ['ischemia', 'angina', 'tracking'] });
  });

  it('holds a threshold whatever became of the test', () => {
    expect(answerTo(withoutTest).ceiling?.value).toBe(108);
    expect(answerTo(withTest({ daysAgo: 4000 })).ceiling?.value).toBe(108);
  });

  it('has an ask line above the target where no limit is known', () => {
    const answer = answerTo(withoutThresholds);
    expect(answer).toMatchObject({
      limits: [],
      ceiling: null,
      target: { lower: 91, upper: 119 },
      askLine: 129,
      patientTarget: { lower: 91, upper: 119 },
      tenSecondCount: { lower: 16, upper: 19 },
      intensityAtCeiling: null,
      workCeilingMets: null,
    });
    expect(answer.cautions.map(({ code }) => code)).toContain('no-ceiling-known');
  });

  it('has no intensity at the ceiling without a usable test, and one below zero under the resting rate', () => {
    expect(answerTo(withTest({ sameRateActingDrugs: false })).intensityAtCeiling).toBeNull();
    const low = answerTo((i) => (i.thresholds = [{ kind: 'angina', heartRate: 60, clearMets: 2 }]));
    expect(low.intensityAtCeiling).toBeCloseTo((50 - 62) / 72, 12);
    expect(low.reasons).toEqual(['no-valid-range']);
  });
});
