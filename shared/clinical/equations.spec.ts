import { describe, expect, it } from 'vitest';
import { bpm, kilograms, meters, metersPerMinute, speedOfMph, vo2, watts } from '../units';
import { fractionOfReserve, rateAtReserve } from './heart-rate-reserve';
import * as equations from './metabolic-equations';
import { fractionOfVo2Reserve, vo2AtReserve } from './oxygen-uptake-reserve';

const weight = kilograms(84);

describe('the equations', () => {
  it('go there and back', () => {
    const uptake = vo2(17.3);
    const speed = metersPerMinute(80);
    expect(equations.walkingVo2(equations.levelWalkingSpeed(uptake), 0)).toBeCloseTo(uptake, 12);
    const grade = equations.walkingGrade(uptake, speed);
    expect(equations.walkingVo2(speed, grade)).toBeCloseTo(uptake, 12);
    expect(equations.cyclingVo2(equations.cyclingPower(uptake, weight), weight)).toBeCloseTo(
      uptake,
      12,
    );
    const arm = equations.armCyclingPower(uptake, weight);
    expect(equations.armCyclingVo2(arm, weight)).toBeCloseTo(uptake, 12);
    const rate = equations.steppingRate(uptake, meters(0.15));
    expect(equations.steppingVo2(rate, meters(0.15))).toBeCloseTo(uptake, 12);
    expect(fractionOfVo2Reserve(vo2(22.4), vo2AtReserve(vo2(22.4), 0.55))).toBeCloseTo(0.55, 12);
    expect(
      fractionOfReserve(bpm(62), bpm(134), rateAtReserve(bpm(62), bpm(134), 0.55)),
    ).toBeCloseTo(0.55, 12);
  });

  it.each<[string, boolean[]]>([
    [
      'walking',
      [49.9, 50, 100, 100.1].map((s) => equations.walkingSpeedInRange(metersPerMinute(s))),
    ],
    ['cycling', [49, 50, 200, 201].map((p) => equations.cyclingPowerInRange(watts(p)))],
    ['arms', [24, 25, 125, 126].map((p) => equations.armCyclingPowerInRange(watts(p)))],
    ['stepping', [11, 12, 30, 31].map((f) => equations.steppingInRange(f, meters(0.15)))],
    ['step height', [0.03, 0.04, 0.4, 0.41].map((h) => equations.steppingInRange(20, meters(h)))],
  ])('hold between their ends: %s', (_equation, within) => {
    expect(within).toEqual([false, true, true, false]);
  });

  it('have no fraction where there is no reserve', () => {
    expect(() => fractionOfReserve(bpm(80), bpm(80), 80)).toThrow(RangeError);
    expect(fractionOfVo2Reserve(vo2(3.5), vo2(3.5))).toBeNull();
  });

  it('place 1.9 mph inside and 1.8 mph outside of the walking range', () => {
    expect(equations.walkingSpeedInRange(speedOfMph(1.9))).toBe(true);
    expect(equations.walkingSpeedInRange(speedOfMph(1.8))).toBe(false);
  });
});
