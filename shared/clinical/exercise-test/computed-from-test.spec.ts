import { describe, expect, it } from 'vitest';
import { bpm, centimeters, kilograms, minutes, mmHg, vo2, watts } from '../../units';
import { computedFromTest } from './computed-from-test';
import type { ComputedValue, RecordedTest } from './recorded-test';

const recorded = (changes: Partial<RecordedTest> = {}): RecordedTest => ({
  protocol: 'bruce',
  mode: 'treadmill',
  ageYears: 60,
  sexAtBirth: 'male',
  height: centimeters(178),
  weight: kilograms(81.6466266),
  time: minutes(7),
  lastSetting: { speedMph: 2.5, gradePercent: 12 },
  lastPower: null,
  gait: 'walk',
  handrail: false,
  restingHeartRate: bpm(64),
  peakHeartRate: bpm(141),
  peakSystolic: mmHg(170),
  recovery: [
    { minute: 1, heartRate: bpm(129) },
    { minute: 2, heartRate: bpm(112) },
  ],
  posture: 'upright',
  effort: 'maximal',
  onBetaBlocker: false,
  measuredVo2: null,
  ...changes,
});

function valueOf(key: string, changes: Partial<RecordedTest> = {}): ComputedValue {
  const value = computedFromTest(recorded(changes)).find((each) => each.key === key);
  if (value === undefined) throw new Error(`no ${key}`);
  return value;
}

describe('what a test comes to', () => {
  it('is told in one list, each with its source', () => {
    const values = computedFromTest(recorded());
    expect(values.map(({ key }) => key)).toEqual([
      'stage-work',
      'peak-foster',
      'peak-friend',
      ...[1, 2, 3, 4, 5, 6].map((index) => `time-${index}`),
      'heart-rate-index',
      'percent-of-predicted',
      'recovery-1',
      'recovery-2',
      'chronotropic-index',
      'rate-pressure-product',
    ]);
    expect(values.filter(({ source }) => source === '')).toEqual([]);
  });

  it('reads stage 2 of Bruce as 7.05 METs, the peak lower', () => {
    expect(valueOf('stage-work').value).toBeCloseTo(7.05, 2);
    expect(valueOf('peak-foster').value).toBeCloseTo(6.11, 2);
    expect(valueOf('peak-friend').value).toBeCloseTo(6.07, 2);
  });

  it.each<[string, string, Partial<RecordedTest>]>([
    ['stage-work', 'walked or ran', { gait: null }],
    ['stage-work', 'not recorded', { lastSetting: null }],
    ['peak-foster', 'handrail', { handrail: null }],
    ['peak-friend', 'handrail', { handrail: true }],
    ['percent-of-predicted', 'sex', { sexAtBirth: 'unknown' }],
    ['percent-of-predicted', 'weight', { weight: null }],
    ['percent-of-predicted', 'peak', { lastSetting: null }],
    ['percent-of-predicted', 'arm', { mode: 'arm' }],
    ['percent-of-predicted', 'height', { mode: 'cycle', height: null }],
    ['stage-work', 'weight', { mode: 'cycle', lastPower: watts(100), weight: null }],
    ['recovery-1', 'peak', { peakHeartRate: null }],
    ['heart-rate-index', 'peak', { peakHeartRate: null }],
    ['heart-rate-index', 'beta blocker', { onBetaBlocker: null }],
    ['heart-rate-index', 'beta blocker', { onBetaBlocker: true }],
    ['chronotropic-index', 'resting', { restingHeartRate: null }],
    ['rate-pressure-product', 'systolic', { peakSystolic: null }],
  ])('%s is not made up: %s', (key, why, changes) => {
    const value = valueOf(key, changes);
    expect(value).toMatchObject({ value: null, judgment: null });
    expect(value.why?.toLowerCase()).toContain(why);
  });

  it('takes a measured peak before an estimate', () => {
    expect(valueOf('percent-of-predicted', { measuredVo2: vo2(21) })).toMatchObject({
      why: 'The peak is measured.',
    });
    expect(valueOf('percent-of-predicted', { measuredVo2: vo2(21) }).value).toBeCloseTo(62.43, 2);
  });

  it('says of an extrapolation that it is one', () => {
    expect(valueOf('stage-work', { lastSetting: { speedMph: 1.7, gradePercent: 10 } }).why).toMatch(
      /extrapolation/,
    );
    expect(valueOf('stage-work', { handrail: true }).why).toMatch(/handrail/);
  });

  it.each<[string, string | null, Partial<RecordedTest>]>([
    ['recovery-1', 'abnormal: 12 or less', {}],
    ['recovery-1', 'abnormal: 18 or less', { posture: 'supine' }],
    ['recovery-1', null, { posture: null }],
    ['recovery-2', 'normal: above 22', {}],
    ['chronotropic-index', 'not low', {}],
    ['chronotropic-index', 'low', { peakHeartRate: bpm(120) }],
    ['chronotropic-index', null, { peakHeartRate: bpm(130), onBetaBlocker: null }],
    ['chronotropic-index', null, { effort: 'submaximal' }],
  ])('judges %s: %s', (key, judgment, changes) => {
    expect(valueOf(key, changes).judgment).toBe(judgment);
  });

  it('works on the cycle and with the arms', () => {
    expect(valueOf('stage-work', { mode: 'cycle', lastPower: watts(100) }).value).toBeCloseTo(
      5.78,
      2,
    );
    expect(
      valueOf('percent-of-predicted', { mode: 'cycle', lastPower: watts(100) }).value,
    ).toBeGreaterThan(50);
    expect(valueOf('stage-work', { mode: 'arm', lastPower: watts(50) }).value).toBeCloseTo(4.15, 2);
  });
});
