import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  answerTo,
  prescriptionRequest,
  withTest,
  withoutTest,
  withoutThresholds,
  type Change,
} from '../../../test/builders/prescription-request';
import { bpm, kilograms, mets, minutes } from '../../units';
import type { PolicyNumbers } from '../policy-numbers';
import { policyFaults } from '../policy-numbers';
import { defaultPolicy } from '../prescribing';
import {
  defaultIntermittentPolicy,
  firstBouts,
  intermittentNumbers,
  longerBouts,
  needsIntermittent,
} from './intermittent';
import type { BoutMoment } from './interval-placement';
import { placeIntervalRate } from './interval-placement';
import { defaultIntervalPolicy, intervalNumbers } from './interval-policy';
import type { IntervalPlan } from './intervals';
import { prescribeIntervals } from './intervals';
import type { ResistanceFacts, WeeksSince } from './resistance';
import { nextLoad, resistanceLimits } from './resistance';
import { defaultResistancePolicy, resistanceNumbers } from './resistance-policy';
import { defaultSessionShape, sessionShapeNumbers } from './session-shape';

const plan = (changes: Partial<IntervalPlan> = {}): IntervalPlan => ({
  repeats: 4,
  workMinutes: minutes(3),
  recoveryMinutes: minutes(3),
  work: { lower: 0.6, upper: 0.8 },
  ...changes,
});

const intervals = (changes: Change[] = [withoutThresholds], given: Partial<IntervalPlan> = {}) =>
  prescribeIntervals(
    plan(given),
    {
      request: prescriptionRequest(...changes),
      answer: answerTo(changes),
      policy: defaultPolicy,
    },
    defaultIntervalPolicy,
  );

const prescribed = (...args: Parameters<typeof intervals>) => {
  const result = intervals(...args);
  if (!result.ok) throw new Error(result.why.join(' '));
  return result.prescription;
};

const refused = (...args: Parameters<typeof intervals>): string => {
  const result = intervals(...args);
  return result.ok ? '' : result.why.join(' ');
};

describe('intervals', () => {
  it('of three minutes go by heart rate, with the work beside it', () => {
    const it = prescribed();
    // Seated 62, peak 134, VO2 22.4: 0.6 and 0.8 of reserve are 105.2 and 119.6 bpm.
    expect(it).toMatchObject({
      leadBy: 'heart-rate',
      target: { lower: 106, upper: 119 },
      effort: { lower: 14, upper: 16 },
      totalMinutes: 24,
      physicianSigns: [],
    });
    expect(it.workMets?.upper).toBeCloseTo((3.5 + 0.8 * 18.9) / 3.5, 9);
    expect(it.recoveryMets).toBeCloseTo((3.5 + 0.4 * 18.9) / 3.5, 9);
  });

  it('under two minutes go by work and effort', () => {
    expect(prescribed([withoutThresholds], { workMinutes: minutes(1.9) })).toMatchObject({
      leadBy: 'work-and-effort',
      target: null,
    });
    expect(prescribed([withoutThresholds], { workMinutes: minutes(2) }).leadBy).toBe('heart-rate');
  });

  it('above 0.80 of reserve are signed by a physician', () => {
    expect(
      prescribed([withoutThresholds], { work: { lower: 0.6, upper: 0.8 } }).physicianSigns,
    ).toEqual([]);
    expect(
      prescribed([withoutThresholds], { work: { lower: 0.6, upper: 0.81 } }).physicianSigns,
    ).toEqual(['above 0.8 of reserve']);
    expect(prescribed([withoutThresholds, (i) => (i.risk = 'high')]).physicianSigns).toEqual([
      'the risk is high or not known',
    ]);
  });

  it('stay under both ceilings', () => {
    // Ischemia at 118: ceiling 108, which is 0.639 of reserve, and 4.45 METs of work.
    const it = prescribed([], { work: { lower: 0.5, upper: 0.8 } });
    expect(it.target?.upper ?? Infinity).toBeLessThanOrEqual(108);
    expect(it.workMets?.upper ?? Infinity).toBeLessThanOrEqual(4.4500001);
    expect(it.effort.upper).toBeLessThanOrEqual(14);
    expect(it.work.upper).toBeCloseTo(0.6389, 4);
  });

  it.each<[string, Change[], Partial<IntervalPlan>]>([
    [
      'pulmonary hypertension',
      [withoutThresholds, (i) => (i.conditions.pulmonaryHypertension = true)],
      {},
    ],
    [
      'assist device',
      [withoutThresholds, (i) => (i.conditions.ventricularAssistDevice = true)],
      {},
    ],
    ['stop', [withoutThresholds, (i) => (i.devices.icd.status = 'unknown')], {}],
    ['stop', [withoutThresholds, (i) => (i.conditions.outflowObstruction = true)], {}],
    ['program week', [withoutThresholds, (i) => (i.programWeek = 2)], {}],
    ['below the work bouts', [], { work: { lower: 0.65, upper: 0.8 } }],
    ['usable test', [withTest({ sameRateActingDrugs: false })], {}],
    ['no peak', [withoutTest, withoutThresholds], { workMinutes: minutes(1) }],
    ['at or under 0.9', [withoutThresholds], { work: { lower: 0.6, upper: 0.91 } }],
    ['at most 4 minutes', [withoutThresholds], { workMinutes: minutes(4.5) }],
    ['1 to 60', [withoutThresholds], { repeats: 0 }],
    ['length', [withoutThresholds], { recoveryMinutes: minutes(0) }],
    ['below the upper', [withoutThresholds], { work: { lower: 0.8, upper: 0.8 } }],
  ])('are refused: %s', (why, changes, given) => {
    expect(refused(changes, given)).toContain(why);
  });

  it('of long bouts without a peak go by effort alone', () => {
    expect(prescribed([withoutTest, withoutThresholds])).toMatchObject({
      leadBy: 'work-and-effort',
      target: null,
      workMets: null,
      recoveryMets: null,
      physicianSigns: ['no test to base the work on'],
    });
  });

  it('never pass a ceiling, whatever is asked', () => {
    const fraction = fc.double({ min: 0.05, max: 0.95, noNaN: true });
    const rate = fc.integer({ min: 80, max: 150 });
    fc.assert(
      fc.property(fraction, fraction, rate, fc.constantFrom(1, 2, 4), (a, b, heartRate, length) => {
        const changes: Change[] = [
          (i) => (i.thresholds = [{ kind: 'ischemia', heartRate, clearMets: null }]),
        ];
        const answer = answerTo(changes);
        const result = intervals(changes, {
          work: { lower: Math.min(a, b), upper: Math.max(a, b) },
          workMinutes: minutes(length),
        });
        if (!result.ok) return;
        const { target, workMets } = result.prescription;
        if (target !== null && answer.ceiling !== null) {
          expect(target.upper).toBeLessThanOrEqual(answer.ceiling.value);
        }
        if (workMets !== null && answer.workCeilingMets !== null) {
          expect(workMets.upper).toBeLessThanOrEqual(answer.workCeilingMets);
        }
      }),
    );
  });
});

describe('a rate within intervals', () => {
  const marks = { target: { lower: bpm(106), upper: bpm(119) }, ceiling: { value: bpm(122) } };
  const moment = (changes: Partial<BoutMoment> = {}): BoutMoment => ({
    kind: 'work',
    minutes: minutes(4),
    minutesIn: minutes(3),
    ...changes,
  });

  it.each<[number, Partial<BoutMoment>, string | null]>([
    [100, {}, 'below'],
    [110, {}, 'in'],
    [120, {}, 'above'],
    [123, {}, 'over-ceiling'],
    [100, { minutesIn: minutes(1) }, null],
    [100, { minutesIn: null }, null],
    [120, { minutesIn: minutes(1) }, 'above'],
    [100, { minutes: minutes(1) }, null],
    [123, { minutes: minutes(1) }, 'over-ceiling'],
    [80, { kind: 'recovery' }, null],
    [121, { kind: 'recovery' }, null],
    [123, { kind: 'recovery' }, 'over-ceiling'],
  ])('%i bpm, %o: %s', (rate, changes, placement) => {
    expect(placeIntervalRate(bpm(rate), moment(changes), marks, defaultIntervalPolicy)).toBe(
      placement,
    );
  });

  it('never reads below in a recovery bout', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 30, max: 200 }),
        fc.double({ min: 0, max: 10, noNaN: true }),
        (rate, at) => {
          const place = placeIntervalRate(
            bpm(rate),
            moment({ kind: 'recovery', minutesIn: minutes(at) }),
            marks,
            defaultIntervalPolicy,
          );
          expect(place).not.toBe('below');
        },
      ),
    );
  });
});

describe('intermittent bouts', () => {
  it.each<[number | null, number | null, boolean | null]>([
    [2.9, null, true],
    [3, null, false],
    [6, 4, true],
    [2.5, 12, false],
    [null, null, null],
  ])('peak %s, longest bout %s: %s', (peak, longest, needed) => {
    const answer = needsIntermittent(
      peak === null ? null : mets(peak),
      longest === null ? null : minutes(longest),
      defaultIntermittentPolicy,
    );
    expect(answer).toBe(needed);
  });

  it('grow longer and fewer until one is left', () => {
    let pattern = firstBouts(null, defaultIntermittentPolicy);
    expect(pattern).toEqual({ bouts: 3, minutesEach: 5, restMinutes: 2, totalMinutes: 15 });
    const seen = [pattern];
    for (let round = 0; round < 20; round += 1) {
      pattern = longerBouts(pattern, defaultIntermittentPolicy);
      seen.push(pattern);
    }
    expect(
      seen.slice(0, 8).map(({ bouts, minutesEach }) => `${bouts} × ${Number(minutesEach)}`),
    ).toEqual(['3 × 5', '3 × 7', '3 × 9', '2 × 11', '2 × 13', '2 × 15', '1 × 17', '1 × 19']);
    expect(pattern).toMatchObject({ bouts: 1, minutesEach: 30, restMinutes: 0 });
    expect(Math.max(...seen.map(({ totalMinutes }) => totalMinutes))).toBeLessThanOrEqual(30);
  });

  it('are no longer than what was managed', () => {
    expect(firstBouts(minutes(3), defaultIntermittentPolicy)).toMatchObject({
      bouts: 5,
      minutesEach: 3,
    });
  });
});

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

describe('the policies of training', () => {
  it.each<[string, PolicyNumbers, Readonly<Record<string, number>>]>([
    ['intervals', intervalNumbers, defaultIntervalPolicy],
    ['intermittent', intermittentNumbers, defaultIntermittentPolicy],
    ['resistance', resistanceNumbers, defaultResistancePolicy],
    ['session', sessionShapeNumbers, defaultSessionShape],
  ])('%s: defaults lie within their bounds, each with a source', (_subject, numbers, values) => {
    expect(policyFaults(numbers, values)).toEqual([]);
    for (const { source, label, lowest, highest } of Object.values(numbers)) {
      expect([source, label]).not.toContain('');
      expect(lowest).toBeLessThan(highest);
    }
  });
});
