import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { kilograms } from '../../units';
import type { ResistanceFacts, WeeksSince } from './resistance';
import { nextLoad, resistanceLimits } from './resistance';
import { defaultResistancePolicy } from './resistance-policy';

describe('resistance', () => {
  const facts = (changes: Partial<ResistanceFacts> = {}): ResistanceFacts => ({
    sternotomy: 'never',
    infarction: 'never',
    stent: 8,
    device: 'never',
    sternumStable: null,
    supervisedWeeks: 4,
    liftingLimit: null,
    ...changes,
  });
  const limits = (changes: Partial<ResistanceFacts> = {}) =>
    resistanceLimits(facts(changes), defaultResistancePolicy);

  it.each<[Partial<ResistanceFacts>, string, string, string]>([
    [{}, 'load', 'load', 'load'],
    [{ stent: 2 }, 'none', 'none', 'none'],
    [{ stent: null }, 'none', 'none', 'none'],
    [{ infarction: 4.9 }, 'none', 'none', 'none'],
    [{ supervisedWeeks: 1 }, 'none', 'none', 'none'],
    [{ sternotomy: 4, sternumStable: true }, 'none', 'none', 'none'],
    [{ sternotomy: 6, sternumStable: true }, 'load', 'light', 'light'],
    [{ sternotomy: 12, sternumStable: true }, 'load', 'load', 'load'],
    [{ sternotomy: 12, sternumStable: null }, 'load', 'light', 'light'],
    [{ sternotomy: 20, sternumStable: false }, 'load', 'none', 'none'],
    [{ device: 5 }, 'load', 'load', 'light'],
    [{ device: null }, 'load', 'load', 'light'],
    [{ device: 6 }, 'load', 'load', 'load'],
  ])('%o: legs %s, arms %s, device arm %s', (changes, legs, arms, deviceArm) => {
    const it = limits(changes);
    expect([it.legs.level, it.arms.level, it.deviceArm.level]).toEqual([legs, arms, deviceArm]);
    if (legs === 'none') expect(it.legs.why.length).toBeGreaterThan(0);
  });

  it('keeps to the lower of policy and order', () => {
    expect(limits({ sternotomy: 6, sternumStable: true }).arms.mostLoad).toBe(3.6);
    expect(
      limits({ sternotomy: 6, sternumStable: true, liftingLimit: kilograms(2) }).arms.mostLoad,
    ).toBe(2);
    expect(limits({ liftingLimit: kilograms(9) }).legs).toMatchObject({
      level: 'load',
      mostLoad: 9,
    });
    expect(limits({ device: 2 })).toMatchObject({ deviceArmAboveShoulder: false });
  });

  it.each<[number | null, number | null, boolean | null, number]>([
    [15, 12, false, 10.5],
    [14, 12, false, 10],
    [15, 13, false, 10],
    [15, 12, true, 10],
    [null, 12, false, 10],
    [15, null, false, 10],
    [15, 12, null, 10],
  ])(
    'after %s repetitions at effort %s, symptoms %s: %d kg',
    (repetitions, effort, symptoms, load) => {
      const history = { load: kilograms(10), repetitions, effort, symptoms };
      expect(nextLoad(history, limits().legs, defaultResistancePolicy)).toBeCloseTo(load, 9);
      const ordered = limits({ liftingLimit: kilograms(9) }).legs;
      expect(nextLoad(history, ordered, defaultResistancePolicy)).toBe(9);
      expect(nextLoad(history, limits({ stent: 1 }).legs, defaultResistancePolicy)).toBeNull();
    },
  );

  it('never grows by what is not known', () => {
    const since = fc.oneof(fc.constant<WeeksSince>('never'), fc.integer({ min: 0, max: 30 }));
    const order = ['none', 'light', 'load'];
    fc.assert(
      fc.property(
        fc.record({ sternotomy: since, infarction: since, stent: since, device: since }),
        fc.constantFrom('sternotomy', 'infarction', 'stent', 'device'),
        fc.boolean(),
        (known, hidden, sternumStable) => {
          const before = limits({ ...known, sternumStable });
          const after = limits({ ...known, sternumStable, [hidden]: null });
          for (const region of ['legs', 'arms', 'deviceArm'] as const) {
            expect(order.indexOf(after[region].level)).toBeLessThanOrEqual(
              order.indexOf(before[region].level),
            );
          }
        },
      ),
    );
  });
});
