import { describe, expect, it } from 'vitest';
import * as units from './index';
import type { Bpm, Mets, MmHg, Range, Vo2 } from './index';

describe('quantities', () => {
  it('do not mix: each of these lines must fail to compile', () => {
    const rate = units.bpm(90);
    // @ts-expect-error a pressure is no heart rate
    const pressure: MmHg = rate;
    // @ts-expect-error a bare number is no heart rate
    const bare: Bpm = 90;
    // @ts-expect-error METs are no oxygen uptake
    const uptake: Vo2 = units.mets(4);
    // @ts-expect-error centimeters are no kilograms
    const heavy: string = units.formatKilograms(units.centimeters(178));
    // @ts-expect-error a range of pressures is no range of rates
    const range: Range<Bpm> = { lower: units.mmHg(90), upper: units.mmHg(120) };
    // @ts-expect-error a speed is no distance
    const far: string = units.formatMeters(units.metersPerMinute(80));
    // @ts-expect-error watts are no METs
    const work: Mets = units.watts(50);
    expect([pressure, bare, uptake, heavy, range, far, work]).toHaveLength(7);
  });

  it('are finite numbers', () => {
    expect(units.bpm(62)).toBe(62);
    for (const value of [NaN, Infinity, -Infinity]) {
      expect(() => units.watts(value)).toThrow(RangeError);
    }
  });

  it.each<[string, (value: unknown) => boolean, number, number]>([
    ['bpm', units.isBpm, 20, 300],
    ['mmHg', units.isMmHg, 20, 350],
    ['VO2', units.isVo2, 4, 80],
    ['METs', units.isMets, 1, 25],
    ['watts', units.isWatts, 0, 1000],
    ['kilograms', units.isKilograms, 25, 350],
    ['centimeters', units.isCentimeters, 100, 250],
    ['meters a minute', units.isMetersPerMinute, 0, 500],
  ])('guard %s', (_unit, guard, lowest, highest) => {
    expect([lowest, highest, lowest - 0.1, highest + 0.1].map(guard)).toEqual([
      true,
      true,
      false,
      false,
    ]);
    expect([NaN, String(lowest), null, undefined].some(guard)).toBe(false);
  });

  it('guard meters, which are above zero', () => {
    expect([0, 0.1, 2000, 2001].map(units.isMeters)).toEqual([false, true, true, false]);
  });

  it('convert exactly', () => {
    expect(units.kilogramsOfPounds(1)).toBe(0.45359237);
    expect(units.poundsOf(units.kilogramsOfPounds(180))).toBeCloseTo(180, 12);
    expect(units.inchesOf(units.centimetersOfInches(70))).toBeCloseTo(70, 12);
    expect(units.mphOf(units.speedOfMph(2.8))).toBeCloseTo(2.8, 12);
    expect(units.feetOf(units.meters(0.3048))).toBe(1);
    expect(units.vo2Of(units.mets(2))).toBe(7);
    expect(units.metsOf(units.vo2(7))).toBe(2);
  });

  it('are shown rounded inward', () => {
    expect(units.formatMets(units.mets(3.16), 'lower')).toBe('3.2 METs');
    expect(units.formatMets(units.mets(4.45), 'upper')).toBe('4.4 METs');
    expect(units.formatVo2(units.vo2(11.06), 'lower')).toBe('11.1 mL/kg/min');
    expect(units.formatBpmRange({ lower: units.bpm(91), upper: units.bpm(108) })).toBe(
      '91–108 bpm',
    );
    expect(
      units.formatBloodPressure({ systolic: units.mmHg(150), diastolic: units.mmHg(90) }),
    ).toBe('150/90 mmHg');
    expect(units.formatBpm(units.bpm(72))).toBe('72 bpm');
    expect(units.formatWatts(units.watts(65))).toBe('65 W');
    expect(units.formatMph(units.speedOfMph(2.8))).toBe('2.8 mph');
    expect(units.formatMeters(units.meters(420))).toBe('420 m');
    expect(units.formatKilograms(units.kilograms(84))).toBe('84.0 kg');
    expect(units.formatCentimeters(units.centimeters(178))).toBe('178 cm');
  });

  it('are set down to a step, noise taken for whole', () => {
    expect(units.snapDown(64.99, 5)).toBe(60);
    expect(units.snapDown(0.3, 0.1)).toBe(0.3);
    expect(units.snapDown(2.8, 0.1)).toBe(2.8);
    expect(units.snapDown(-0.2, 0.5)).toBe(-0.5);
    expect([units.roundUp(90.80000000000001), units.roundUp(90.0000000001)]).toEqual([91, 90]);
    expect(units.roundDown(129.99999999999997)).toBe(130);
  });
});
