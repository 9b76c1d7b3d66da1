import { describe, expect, it } from 'vitest';
import { kilograms, meters, mets, watts } from '../../units';
import { defaultPolicy } from '../prescribing';
import type { MachineSetting } from './machine-setting';
import { isSameSetting, metsOfSetting, settingUpTo } from './machine-setting';

const walkAt = (speedMph: number, gradePercent: number): MachineSetting => ({
  modality: 'treadmill-walk',
  speedMph,
  gradePercent,
});

describe('a machine’s setting', () => {
  const machine = { weight: kilograms(80), equipment: defaultPolicy.equipment };

  it.each<[MachineSetting, number | null]>([
    [walkAt(3, 0), 3.2992],
    [walkAt(1.8, 0), null],
    [{ modality: 'treadmill-run', speedMph: 5, gradePercent: 0 }, 8.6637],
    [{ modality: 'treadmill-run', speedMph: 2.9, gradePercent: 0 }, null],
    [{ modality: 'cycle', powerWatts: watts(100) }, 5.8571],
    [{ modality: 'cycle', powerWatts: watts(45) }, null],
    [{ modality: 'arm', powerWatts: watts(50) }, 4.2143],
    [{ modality: 'arm', powerWatts: watts(20) }, null],
    [{ modality: 'step', stepHeightMeters: meters(0.15), stepsPerMinute: 20 }, 4.1949],
    [{ modality: 'step', stepHeightMeters: meters(0.15), stepsPerMinute: 31 }, null],
    [{ modality: 'stepper', mets: mets(4) }, 4],
    [{ modality: 'stepper', mets: mets(0.5) }, null],
  ])('%o: %s METs', (setting, work) => {
    const found = metsOfSetting(setting, machine.weight);
    if (work === null) expect(found).toBeNull();
    else expect(found).toBeCloseTo(work, 3);
  });

  it.each<[MachineSetting, number, MachineSetting | null]>([
    [
      { modality: 'cycle', powerWatts: watts(60) },
      4.4,
      { modality: 'cycle', powerWatts: watts(60) },
    ],
    [
      { modality: 'cycle', powerWatts: watts(60) },
      4.5,
      { modality: 'cycle', powerWatts: watts(60) },
    ],
    [
      { modality: 'cycle', powerWatts: watts(60) },
      4.6,
      { modality: 'cycle', powerWatts: watts(65) },
    ],
    [{ modality: 'cycle', powerWatts: watts(60) }, 3, null],
    [walkAt(3.4, 2), 5, walkAt(3.4, 2.5)],
    [walkAt(3.4, 2), 3.7, walkAt(3.4, 0)],
    [walkAt(3.4, 2), 3.2, walkAt(2.8, 0)],
    [walkAt(2.5, 10), 6.6, walkAt(2.6, 10)],
    [walkAt(3, 10), 9, walkAt(3, 10)],
    [
      { modality: 'treadmill-run', speedMph: 5, gradePercent: 1 },
      9.2,
      { modality: 'treadmill-run', speedMph: 5.1, gradePercent: 1 },
    ],
    [
      { modality: 'step', stepHeightMeters: meters(0.15), stepsPerMinute: 20 },
      4.5,
      { modality: 'step', stepHeightMeters: meters(0.15), stepsPerMinute: 21 },
    ],
    [{ modality: 'stepper', mets: mets(4) }, 4.37, { modality: 'stepper', mets: mets(4.3) }],
  ])('%o up to %d METs: %o', (setting, work, expected) => {
    expect(settingUpTo(setting, mets(work), machine)?.setting ?? null).toEqual(expected);
  });

  it('is none without the weight', () => {
    const cycle: MachineSetting = { modality: 'cycle', powerWatts: watts(60) };
    expect(settingUpTo(cycle, mets(5), { ...machine, weight: null })).toBeNull();
    expect(metsOfSetting(cycle, null)).toBeNull();
  });

  it('is the same only on the same machine', () => {
    expect(isSameSetting(walkAt(3, 1), walkAt(3, 1))).toBe(true);
    expect(
      isSameSetting(walkAt(3, 1), { ...walkAt(3, 1), modality: 'treadmill-run' } as MachineSetting),
    ).toBe(false);
  });
});
