import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withTest,
  withoutTest,
  withoutThresholds,
} from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';

const intensity =
  (lower: number, upper: number): Change =>
  (i) =>
    (i.intensity = { lower, upper });

/** Seated 60, peak 160: each beat is a hundredth of the reserve. */
const hundred: Change[] = [(i) => (i.resting.seated = 60), withTest({ peakHeartRate: 160 })];

const ceilingAt =
  (rate: number, clearMets: number | null = null): Change =>
  (i) =>
    (i.thresholds = [{ kind: 'ischemia', heartRate: rate + 10, clearMets }]);

const afib: Change = (i) => (i.rhythm = 'atrial-fibrillation');

describe('effort', () => {
  it.each<[string, Change[], [number, number]]>([
    [
      'no valid range comes before all else',
      [ceilingAt(80), (i) => (i.conditions.pulmonaryHypertension = true)],
      [9, 11],
    ],
    ['assist device', [(i) => (i.conditions.ventricularAssistDevice = true)], [11, 13]],
    [
      'pulmonary hypertension',
      [withoutThresholds, (i) => (i.conditions.pulmonaryHypertension = true)],
      [11, 13],
    ],
    ['denervated transplant', [(i) => (i.conditions.transplant = 'denervated')], [12, 14]],
    [
      'pulmonary hypertension before a denervated transplant',
      [
        (i) => (i.conditions.transplant = 'denervated'),
        (i) => (i.conditions.pulmonaryHypertension = true),
      ],
      [11, 13],
    ],
    ['percent of peak', [(i) => (i.choice.method = 'percent-of-peak')], [11, 13]],
    ['resting-plus', [(i) => (i.choice.method = 'resting-plus')], [11, 13]],
    [
      'chosen effort, though a peak is accepted',
      [(i) => (i.choice.method = 'perceived-exertion')],
      [11, 13],
    ],
    [
      'no usable test, though a peak is accepted',
      [withTest({ sameRateActingDrugs: false })],
      [11, 13],
    ],
    ['cannot lead and no peak', [afib, withoutTest], [11, 13]],
    ['cannot lead and no uptake', [afib, withTest({ peakVo2: null })], [11, 13]],
  ])('%s', (_case, changes, [lower, upper]) => {
    expect(answerTo(changes).perceivedExertion).toEqual({ scale: 'borg-6-20', lower, upper });
  });

  it.each<[number, number, [number, number]]>([
    [0.39, 0.6, [9, 13]],
    [0.4, 0.6, [11, 13]],
    [0.4, 0.61, [11, 14]],
    [0.4, 0.7, [11, 14]],
    [0.4, 0.71, [11, 16]],
    [0.59, 0.8, [11, 16]],
    [0.6, 0.8, [14, 16]],
    [0.6, 0.81, [14, 17]],
  ])('fractions %d–%d by reserve', (lower, upper, [low, high]) => {
    const changes = [...hundred, withoutThresholds, intensity(lower, upper)];
    expect(answerTo(changes).perceivedExertion).toMatchObject({ lower: low, upper: high });
    expect(answerTo([...changes, afib]).perceivedExertion).toMatchObject({
      lower: low,
      upper: high,
    });
  });

  it.each<[number, [number, number]]>([
    [130, [11, 14]],
    [120, [11, 13]],
    [100, [11, 13]],
    [99, [9, 11]],
  ])('a ceiling of %d leaves that much of the reserve', (rate, [lower, upper]) => {
    const answer = answerTo([...hundred, ceilingAt(rate, 25), afib]);
    expect(answer.perceivedExertion).toMatchObject({ lower, upper });
  });

  it('never puts the lower end above the upper', () => {
    const answer = answerTo([...hundred, ceilingAt(120, 25), afib, intensity(0.6, 0.8)]);
    expect(answer.perceivedExertion).toMatchObject({ lower: 13, upper: 13 });
  });

  it('heeds the work ceiling too, also where heart rate leads', () => {
    // 22.4 mL/kg/min at peak: 2.8 METs are 0.33 of its reserve, 4.2 METs 0.59, 4.6 METs 0.67.
    const at = (clearMets: number) => answerTo([...hundred, ceilingAt(150, clearMets)]);
    expect(at(2.8).perceivedExertion).toMatchObject({ lower: 9, upper: 11 });
    expect(at(4.2).perceivedExertion).toMatchObject({ lower: 11, upper: 13 });
    expect(at(4.6).perceivedExertion).toMatchObject({ lower: 11, upper: 14 });
    expect(at(4.6).leadBy).toBe('heart-rate');
  });

  it('on an estimated maximum goes by the intensity: the rate at a ceiling tells no fraction', () => {
    const answer = answerTo([
      withoutTest,
      (i) => (i.choice.maximum = 'brawner'),
      (i) => (i.thresholds = [{ kind: 'angina', heartRate: 106, clearMets: 3 }]),
      intensity(0.4, 0.8),
    ]);
    expect(answer.target).toEqual({ lower: 85, upper: 96 });
    expect(answer.perceivedExertion).toMatchObject({ lower: 11, upper: 16 });
  });
});
