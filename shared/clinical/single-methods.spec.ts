import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bpm,
  centimeters,
  formatMinutes,
  isMilliseconds,
  kilograms,
  meters,
  metersPerMinute,
  mets,
  milliseconds,
  minutes,
  minutesOf,
  seconds,
  speedOfMph,
  vo2,
} from '../units';
import { chronotropicIndex, isIndexLow } from './chronotropic-index';
import { cycleLengthOfRate, rateOfCycleLength } from './cycle-length';
import { netVo2, relativeVo2 } from './energy-expenditure';
import {
  averageStandTime,
  chairStandPoints,
  isWorseThanAverage,
  standMarks,
} from './five-times-sit-to-stand';
import { metabolicEquations, treadmillSpeedInRange } from './gait';
import { metsOfHeartRateIndex } from './heart-rate-index';
import { cardiaMaximum, meckiMaximum, sydoMaximum } from './maximum-heart-rate';
import { judgeWalkChange } from './six-minute-walk-change';
import type { WalkCondition } from './six-minute-walk-change';
import { lowerLimitOfWalk, predictedWalk, predictedWalkByIndex } from './six-minute-walk-predicted';
import { runWorkloads } from './run-workloads';
import { defaultPolicy } from './prescribing';
import { edwardsZone, sessionLoad } from './training-load';

describe('the cycle length of a device', () => {
  it.each([
    [400, 150],
    [500, 120],
    [300, 200],
  ])('%i ms is %i bpm, and back', (cycle, rate) => {
    expect(rateOfCycleLength(milliseconds(cycle))).toBe(rate);
    expect(cycleLengthOfRate(bpm(rate))).toBe(cycle);
  });

  it('of 350 ms is 171.4 bpm, printed as 171', () => {
    expect(rateOfCycleLength(milliseconds(350))).toBeCloseTo(171.43, 2);
  });

  it('goes there and back, and refuses none', () => {
    fc.assert(
      fc.property(fc.integer({ min: 200, max: 3000 }), (cycle) => {
        expect(cycleLengthOfRate(rateOfCycleLength(milliseconds(cycle)))).toBeCloseTo(cycle, 9);
      }),
    );
    expect(() => rateOfCycleLength(milliseconds(0))).toThrow(RangeError);
    expect(() => cycleLengthOfRate(bpm(0))).toThrow(RangeError);
    expect([199, 200, 3000, 3001].map(isMilliseconds)).toEqual([false, true, true, false]);
  });
});

describe('the chronotropic index', () => {
  it.each<[number, boolean | null, boolean | null]>([
    [0.8, false, false],
    [0.79, false, true],
    [0.79, true, false],
    [0.61, true, true],
    [0.79, null, null],
    [0.61, null, true],
    [0.81, null, false],
  ])('%d on a beta blocker %s: low is %s', (index, onBetaBlocker, low) => {
    expect(isIndexLow(index, onBetaBlocker)).toBe(low);
  });

  it('has none without a reserve', () => {
    expect(() => chronotropicIndex(bpm(140), bpm(70), bpm(70))).toThrow(RangeError);
  });
});

describe('five stands', () => {
  it.each<[number, number | null]>([
    [59, null],
    [60, 11.4],
    [69.9, 11.4],
    [70, 12.6],
    [89, 14.8],
    [90, null],
  ])('at %d years the average is %s', (age, time) => {
    expect(averageStandTime(age)).toBe(time);
  });

  it('have marks of their own for falls and disability', () => {
    expect(standMarks.disability).toBeLessThan(standMarks.recurrentFalls);
  });

  it('are judged only where an average is', () => {
    expect(isWorseThanAverage(seconds(20), 55)).toBeNull();
    expect(isWorseThanAverage(seconds(11.4), 65)).toBe(false);
    const points = [null, seconds(60.1), seconds(60), seconds(13.69)].map((time) =>
      chairStandPoints(time, 'standing-fifth-time'),
    );
    expect(points).toEqual([0, 0, 1, 3]);
    expect(chairStandPoints(seconds(10), 'seated-fifth-time')).toBeNull();
  });
});

describe('the six-minute walk', () => {
  const man = {
    ageYears: 60,
    sexAtBirth: 'male',
    height: centimeters(175),
    weight: kilograms(80),
  } as const;
  const woman = {
    ageYears: 65,
    sexAtBirth: 'female',
    height: centimeters(162),
    weight: kilograms(70),
  } as const;

  it('has a lower limit below its prediction', () => {
    expect(predictedWalk(man) - lowerLimitOfWalk(man)).toBeCloseTo(153, 9);
    expect(predictedWalk(woman) - lowerLimitOfWalk(woman)).toBeCloseTo(139, 9);
    expect(predictedWalkByIndex(26, 60, 'female')).toBeCloseTo(504.96, 2);
  });

  it.each<[WalkCondition, number, string]>([
    ['coronary-disease', 25, 'gain'],
    ['coronary-disease', 24.9, 'none'],
    ['coronary-disease', -25, 'loss'],
    ['heart-failure', 35, 'none'],
    ['heart-failure', 36, 'gain'],
    ['general', 30, 'gain'],
  ])('%s, %d m: %s', (condition, change, important) => {
    const judged = judgeWalkChange(meters(400), meters(400 + change), condition);
    expect(judged).toMatchObject({ important });
  });
});

describe('the treadmill’s gait', () => {
  it('shows each equation the range that it is tested against', () => {
    for (const gait of ['walk', 'run'] as const) {
      const shown = metabolicEquations.find(({ modality }) => modality === `treadmill-${gait}`);
      for (const { lowest, highest } of shown?.ranges ?? []) {
        const inRange = (speed: number) => treadmillSpeedInRange(gait, metersPerMinute(speed));
        expect([lowest - 0.1, lowest].map(inRange)).toEqual([false, true]);
        if (highest !== null) expect([highest, highest + 0.1].map(inRange)).toEqual([true, false]);
      }
    }
    expect(treadmillSpeedInRange('walk', speedOfMph(4.2))).toBe(false);
  });
});

describe('a run', () => {
  it('is level at the speed of the work, set down to the treadmill’s step', () => {
    const [start, limit] = runWorkloads(
      { lower: mets(5), upper: mets(8) },
      defaultPolicy.equipment,
    );
    expect(start).toMatchObject({ speedMph: null, mets: null, withinEquationRange: false });
    expect(start?.why).toContain('walk instead');
    // 122.5 m/min is 4.567 mph.
    expect(limit).toMatchObject({ speedMph: 4.5, gradePercent: 0, why: null });
    expect(limit?.mets ?? Infinity).toBeLessThanOrEqual(8);
    expect(runWorkloads(null, defaultPolicy.equipment)).toEqual([]);
  });
});

describe('smaller ones', () => {
  it('refuse what they cannot take', () => {
    expect(() => metsOfHeartRateIndex(bpm(100), bpm(0))).toThrow(RangeError);
    expect(() => sessionLoad(13, minutes(30))).toThrow(RangeError);
    expect(() => sessionLoad(-1, minutes(30))).toThrow(RangeError);
  });

  it('hold their edges', () => {
    expect([49.9, 50, 59.9, 60, 90, 104].map(edwardsZone)).toEqual([0, 1, 1, 2, 5, 5]);
    expect(meckiMaximum(60, bpm(68), 30, 10.9)).toBe(114);
    expect(sydoMaximum(60, 'male')).toBe(163);
    expect(cardiaMaximum(40)).toBeCloseTo(173, 9);
    expect(netVo2(vo2(10.5))).toBe(7);
    expect(relativeVo2(2.4, kilograms(48))).toBe(50);
    expect([minutesOf(seconds(795)), formatMinutes(minutes(13.25))]).toEqual([13.25, '13:15']);
  });
});
