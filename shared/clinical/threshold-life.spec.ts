import { describe, expect, it } from 'vitest';
import { bpm } from '../units';
import { thresholdKinds } from './prescribing';
import type { LaterTest, StandingThreshold } from './threshold-life';
import { whyNotSuperseded } from './threshold-life';

const threshold = (changes: Partial<StandingThreshold> = {}): StandingThreshold => ({
  kind: 'ischemia',
  heartRate: bpm(118),
  daysAgo: 90,
  ...changes,
});

const clean = (changes: Partial<LaterTest> = {}): LaterTest => ({
  daysAgo: 3,
  peakHeartRate: bpm(118),
  endedBy: 'fatigue',
  found: [],
  ecgShowsIschemia: true,
  sameRateActingDrugs: true,
  eventSince: false,
  ...changes,
});

describe('a threshold', () => {
  it.each(thresholdKinds)('of %s may be superseded by a later clean test at its rate', (kind) => {
    expect(whyNotSuperseded(threshold({ kind }), clean())).toEqual([]);
  });

  it.each<[Partial<LaterTest>, RegExp]>([
    [{ daysAgo: 90 }, /not later/],
    [{ peakHeartRate: bpm(117) }, /did not reach/],
    [{ sameRateActingDrugs: false }, /drugs/],
    [{ sameRateActingDrugs: null }, /drugs/],
    [{ eventSince: true }, /event/],
    [{ eventSince: null }, /event/],
    [{ found: null }, /not recorded/],
    [{ found: ['ischemia'] }, /not clean/],
    [{ found: ['angina'] }, /not clean/],
    [{ endedBy: 'st-change' }, /not clean/],
    [{ endedBy: 'arrhythmia' }, /not clean/],
    [{ ecgShowsIschemia: false }, /ECG/],
    [{ ecgShowsIschemia: null }, /ECG/],
  ])('stays after %o', (changes, why) => {
    const objections = whyNotSuperseded(threshold(), clean(changes));
    expect(objections).toHaveLength(1);
    expect(objections[0]).toMatch(why);
  });

  it('of arrhythmia asks for no ST segments, and is not held by another finding', () => {
    const test = clean({ ecgShowsIschemia: false, found: ['ischemia'] });
    expect(whyNotSuperseded(threshold({ kind: 'arrhythmia' }), test)).toEqual([]);
  });
});
