import { describe, expect, it } from 'vitest';
import { bpm } from '../units';
import { placeHeartRate, placeReading } from './placement';
import type { Marks, Placement } from './placement';
import type { VitalPhase } from './vital-sign-bounds';

const target = { lower: bpm(91), upper: bpm(108) };
const ceiling = { value: bpm(112) };

describe('where a heart rate lies', () => {
  it.each<[number, Marks, Placement | null]>([
    [90, { target, ceiling }, 'below'],
    [91, { target, ceiling }, 'in'],
    [108, { target, ceiling }, 'in'],
    [109, { target, ceiling }, 'above'],
    [112, { target, ceiling }, 'above'],
    [113, { target, ceiling }, 'over-ceiling'],
    [113, { target, ceiling: null }, 'above'],
    [112, { target: null, ceiling }, null],
    [113, { target: null, ceiling }, 'over-ceiling'],
    [180, { target: null, ceiling: null }, null],
  ])('%d', (rate, marks, placement) => {
    expect(placeHeartRate(bpm(rate), marks)).toBe(placement);
  });
});

describe('where a reading lies', () => {
  it.each<[VitalPhase, number | null, Placement | null]>([
    ['exercise', 90, 'below'],
    ['exercise', 100, 'in'],
    ['exercise', null, null],
    ['resting', 70, null],
    ['resting', 113, 'over-ceiling'],
    ['recovery', 100, null],
    ['recovery', 113, 'over-ceiling'],
  ])('%s %s', (phase, rate, placement) => {
    const heartRate = rate === null ? null : bpm(rate);
    expect(placeReading(phase, heartRate, { target, ceiling })).toBe(placement);
  });
});
