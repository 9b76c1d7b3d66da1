import { describe, expect, it } from 'vitest';
import {
  answerTo,
  withTest,
  withoutTest,
  withoutThresholds,
} from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';

const peakReserve = 22.4 - 3.5;
const at = (fraction: number) => 3.5 + fraction * peakReserve;

const thresholds =
  (...rows: [number, number | null][]): Change =>
  (i) =>
    (i.thresholds = rows.map(([heartRate, clearMets]) => ({
      kind: 'ischemia' as const,
      heartRate,
      clearMets,
    })));

describe('the work ceiling', () => {
  it.each<[string, Change[], number | null]>([
    ['none without a threshold', [withoutThresholds], null],
    ['the work tolerated clear of the threshold', [thresholds([118, 3.2])], 3.2],
    ['also without any test', [withoutTest, thresholds([118, 3.2], [130, 5])], 3.2],
    ['derived from the test where it is not known', [thresholds([118, null])], at(46 / 72) / 3.5],
    [
      'from the rate less its margin, not rounded',
      [thresholds([118.5, null])],
      at(46.5 / 72) / 3.5,
    ],
    ['the lowest of both', [thresholds([118, null], [130, 4])], 4],
    ['on the resting rate of the test', [withTest({ restingHeartRate: 70 })], at(38 / 64) / 3.5],
    ['the line is not clamped above', [thresholds([150, null])], at(78 / 72) / 3.5],
    ['nor below', [thresholds([62, null])], at(-10 / 72) / 3.5],
    [
      'null when one threshold has none',
      [withTest({ peakVo2: null }), thresholds([118, 3], [130, null])],
      null,
    ],
    ['null when the test is not accepted', [withTest({ eventSince: true })], null],
    [
      'from a test whose drugs have changed',
      [withTest({ sameRateActingDrugs: false })],
      at(46 / 72) / 3.5,
    ],
  ])('%s', (_case, changes, expected) => {
    const { workCeilingMets } = answerTo(changes);
    if (expected === null) expect(workCeilingMets).toBeNull();
    else expect(workCeilingMets).toBeCloseTo(expected, 9);
  });

  it('is shown without a target, and its absence is a caution only beside a threshold', () => {
    const answer = answerTo([withoutTest, thresholds([118, 3.2])]);
    expect(answer).toMatchObject({ workCeilingMets: 3.2, targetVo2: null });
    const unknown = answerTo(withoutTest).cautions.map(({ code }) => code);
    expect(unknown).toContain('work-ceiling-unknown');
    const none = answerTo([withoutTest, withoutThresholds]).cautions.map(({ code }) => code);
    expect(none).not.toContain('work-ceiling-unknown');
  });
});

describe('the work target', () => {
  const afib: Change = (i) => (i.rhythm = 'atrial-fibrillation');

  it.each<[string, Change[], [number, number] | null]>([
    ['the intensity where nothing limits', [withoutThresholds], [0.4, 0.8]],
    ['also where heart rate cannot lead', [withoutThresholds, afib], [0.4, 0.8]],
    ['cut to the heart-rate ceiling of a usable test', [thresholds([118, 25])], [0.4, 46 / 72]],
    ['cut there also where heart rate cannot lead', [thresholds([118, 25]), afib], [0.4, 46 / 72]],
    [
      'not by the rate of a test that is not usable, but by its work',
      [thresholds([118, null]), withTest({ sameRhythmAndDevice: false, restingHeartRate: 70 })],
      [0.4, 38 / 64],
    ],
    ['none with nothing left', [thresholds([118, 2.5])], null],
    [
      'none when a physician sets all',
      [withoutThresholds, (i) => (i.conditions.outflowObstruction = true)],
      null,
    ],
    ['none without a valid range', [thresholds([90, 6])], null],
    [
      'percent of peak by its own bound',
      [withoutThresholds, (i) => (i.choice.method = 'percent-of-peak')],
      [0.4, (0.8 * 134 - 62) / 72],
    ],
    [
      'resting-plus by its own bound',
      [withoutThresholds, (i) => (i.choice.method = 'resting-plus')],
      [0.4, 30 / 72],
    ],
    [
      'observed work under the intensity',
      [
        withoutThresholds,
        (i) => (i.choice.method = 'observed-work'),
        (i) =>
          (i.observedWork = {
            medianHeartRate: 84,
            sessions: 2,
            perceivedExertion: { lower: 11, upper: 12 },
          }),
      ],
      null,
    ],
  ])('%s', (_case, changes, fractions) => {
    const { targetVo2, targetMets } = answerTo(changes);
    if (fractions === null) {
      expect([targetVo2, targetMets]).toEqual([null, null]);
      return;
    }
    expect(targetVo2?.lower).toBeCloseTo(at(fractions[0]), 9);
    expect(targetVo2?.upper).toBeCloseTo(at(fractions[1]), 9);
    expect(targetMets?.upper).toBeCloseTo(at(fractions[1]) / 3.5, 9);
  });

  it('is cut at the work ceiling, to the last digit', () => {
    const { targetMets, targetVo2 } = answerTo(thresholds([130, 3.7]));
    expect(targetMets?.upper).toBe(3.7);
    expect(targetVo2?.upper).toBeCloseTo(12.95, 9);
  });

  it('keeps a fraction of reserve for a heart rate from a test that is not usable', () => {
    const answer = answerTo([
      withoutThresholds,
      withTest({ sameRateActingDrugs: false }),
      (i) => (i.choice.method = 'resting-plus'),
    ]);
    expect(answer.method).toBe('resting-plus');
    expect(answer.targetVo2?.upper).toBeCloseTo(at(0.8), 9);
  });
});
