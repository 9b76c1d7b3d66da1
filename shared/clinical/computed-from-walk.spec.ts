import { describe, expect, it } from 'vitest';
import { centimeters, kilograms, meters } from '../units';
import { computedFromWalk } from './computed-from-walk';
import type { RecordedWalk } from './computed-from-walk';

const walk = (changes: Partial<RecordedWalk> = {}): RecordedWalk => ({
  distance: meters(400),
  ageYears: 60,
  sexAtBirth: 'male',
  height: centimeters(175),
  weight: kilograms(80),
  first: null,
  condition: 'coronary-disease',
  ...changes,
});

describe('what a six-minute walk comes to', () => {
  it('is set against its prediction, and estimates a peak', () => {
    const { prediction, peakVo2, change } = computedFromWalk(walk());
    expect(prediction?.predicted).toBeCloseTo(573.75, 2);
    expect(prediction?.percentOfPredicted).toBeCloseTo(69.72, 2);
    expect(prediction?.belowLimit).toBe(true);
    expect(peakVo2).toBeCloseTo(14.148, 6);
    expect(change).toBeNull();
  });

  it('is set against the first of the course', () => {
    expect(computedFromWalk(walk({ first: meters(370) })).change).toMatchObject({
      change: 30,
      important: 'gain',
    });
  });

  it.each<[string, Partial<RecordedWalk>]>([
    ['40 to 80', { ageYears: 81 }],
    ['40 to 80', { ageYears: 39 }],
    ['sex', { sexAtBirth: 'unknown' }],
    ['height', { height: null }],
    ['weight', { weight: null }],
  ])('has no prediction without %s', (why, changes) => {
    const computed = computedFromWalk(walk(changes));
    expect(computed.prediction).toBeNull();
    expect(computed.whyNoPrediction).toContain(why);
  });
});
