import { describe, expect, it } from 'vitest';
import { defaultResistancePolicy } from './resistance-policy';
import type { RestrictionFacts } from './restrictions';
import {
  defaultRestrictions,
  machinesWithheld,
  restrictionEffects,
  restrictionKinds,
} from './restrictions';

const none: RestrictionFacts = {
  sternotomy: 'never',
  device: 'never',
  dissection: false,
  peripheralArteryDisease: false,
  ordered: [],
};

describe('restrictions by policy', () => {
  it.each<[Partial<RestrictionFacts>, string[]]>([
    [{}, []],
    [{ sternotomy: 11 }, ['sternum']],
    [{ sternotomy: 12 }, []],
    [{ sternotomy: null, device: null }, ['sternum', 'device-arm']],
    [{ device: 5 }, ['device-arm']],
    [{ device: 6 }, []],
    [{ dissection: true, peripheralArteryDisease: true }, ['pressure', 'claudication']],
    [{ sternotomy: 2, device: 2, ordered: ['sternum'] }, ['device-arm']],
  ])('%o: %o', (facts, kinds) => {
    const restrictions = defaultRestrictions({ ...none, ...facts }, defaultResistancePolicy);
    expect(restrictions.map(({ kind }) => kind)).toEqual(kinds);
  });

  it('say what they mean, and withhold machines once', () => {
    for (const kind of restrictionKinds) expect(restrictionEffects[kind].words).not.toBe('');
    expect(machinesWithheld(['sternum', 'device-arm', 'fall', 'joint'])).toEqual([
      'arm',
      'treadmill-run',
      'step',
    ]);
    expect(machinesWithheld(['lifting', 'oxygen'])).toEqual([]);
  });
});
