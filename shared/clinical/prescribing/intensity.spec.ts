import { describe, expect, it } from 'vitest';
import { answerTo, withTest } from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';

const fromPolicy: Change = (i) => (i.intensity = null);
const wide = { lower: 0.4, upper: 0.8 };
const narrow = { lower: 0.4, upper: 0.6 };
const lowCapacity = { lower: 0.3, upper: 0.6 };

describe('intensity', () => {
  it.each<[string, Change[], object]>([
    [
      'the request first',
      [(i) => (i.intensity = { lower: 0.5, upper: 0.7 })],
      { lower: 0.5, upper: 0.7 },
    ],
    ['wide for moderate risk from week 3', [fromPolicy, (i) => (i.programWeek = 3)], wide],
    ['wide for low risk', [fromPolicy, (i) => (i.risk = 'low')], wide],
    ['narrow in week 2', [fromPolicy, (i) => (i.programWeek = 2)], narrow],
    ['narrow for high risk', [fromPolicy, (i) => (i.risk = 'high')], narrow],
    ['narrow for unknown risk', [fromPolicy, (i) => (i.risk = 'unknown')], narrow],
    [
      'low capacity before narrow',
      [fromPolicy, (i) => (i.risk = 'high'), withTest({ peakVo2: 10.4 })],
      lowCapacity,
    ],
    ['a peak of 3 METs is not under 3', [fromPolicy, withTest({ peakVo2: 10.5 })], wide],
    [
      'low capacity also where only work may rest on the test',
      [fromPolicy, withTest({ peakVo2: 10, sameRateActingDrugs: false })],
      lowCapacity,
    ],
    [
      'not from a test that is not accepted',
      [fromPolicy, withTest({ peakVo2: 10, eventSince: true })],
      wide,
    ],
  ])('%s', (_case, changes, expected) => {
    expect(answerTo(changes).intensity).toEqual(expected);
  });

  it('is told also when effort leads', () => {
    expect(answerTo([fromPolicy, (i) => (i.rhythm = 'atrial-flutter')]).intensity).toEqual(wide);
  });
});
