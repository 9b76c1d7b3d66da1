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
import { bpm, minutes } from '../../units';
import { defaultPolicy } from '../prescribing';
import type { BoutMoment } from './interval-placement';
import { placeIntervalRate } from './interval-placement';
import { defaultIntervalPolicy } from './interval-policy';
import type { IntervalPlan } from './intervals';
import { prescribeIntervals } from './intervals';

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
