import { describe, expect, it } from 'vitest';
import {
  answerTo,
  prescriptionRequest,
  withoutTest,
  withoutThresholds,
} from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';
import { evaluatePrescription } from './evaluate-prescription';
import { defaultPolicy } from './policy';
import type { MaximumMethod, Method } from './request';

const choose =
  (method: Method | null, maximum: MaximumMethod | null = null): Change =>
  (i) =>
    (i.choice = { method, maximum });

const observed =
  (sessions: number, lower: number, upper: number): Change =>
  (i) =>
    (i.observedWork = {
      medianHeartRate: 98,
      sessions,
      perceivedExertion: { lower, upper },
    });

const afib: Change = (i) => (i.rhythm = 'atrial-fibrillation');

describe('the method proposed', () => {
  it.each<[string, Change[], Method]>([
    ['the reserve, with a usable test', [observed(3, 11, 13)], 'heart-rate-reserve'],
    ['observed work, without one', [withoutTest, observed(2, 9, 13)], 'observed-work'],
    [
      'effort, when one session was observed',
      [withoutTest, observed(1, 9, 13)],
      'perceived-exertion',
    ],
    [
      'effort, when the work was too light',
      [withoutTest, observed(2, 8, 12)],
      'perceived-exertion',
    ],
    [
      'effort, when the work was too hard',
      [withoutTest, observed(2, 11, 14)],
      'perceived-exertion',
    ],
    ['effort, when heart rate cannot lead', [observed(3, 11, 13), afib], 'perceived-exertion'],
  ])('%s', (_case, changes, method) => {
    expect(answerTo(changes).method).toBe(method);
  });
});

describe('a choice that applies', () => {
  it.each<[string, Change[], object]>([
    ['percent of peak', [choose('percent-of-peak')], { target: { lower: 88, upper: 107 } }],
    [
      'percent of peak, its maximum named, own fractions',
      [
        choose('percent-of-peak', 'measured'),
        (i) => (i.percentOfPeak = { lower: 0.6, upper: 0.7 }),
      ],
      { target: { lower: 81, upper: 93 }, maximum: { method: 'measured', value: 134 } },
    ],
    [
      'observed work, 5 to each side of the median',
      [choose('observed-work'), observed(2, 11, 13), withoutThresholds],
      { target: { lower: 93, upper: 103 }, maximum: null },
    ],
    [
      'resting-plus, from the seated rate',
      [choose('resting-plus')],
      { target: { lower: 82, upper: 92 }, maximum: null },
    ],
    [
      'resting-plus, from the standing rate, capped',
      [choose('resting-plus'), withoutThresholds, (i) => (i.resting.standing = 92)],
      { target: { lower: 112, upper: 120 } },
    ],
    [
      'a maximum alone means the reserve',
      [choose(null, 'measured')],
      { method: 'heart-rate-reserve' },
    ],
    [
      'effort, beside any other reason',
      [choose('perceived-exertion'), withoutTest],
      { method: 'perceived-exertion', reasons: ['no-usable-test', 'chosen'] },
    ],
    [
      'effort, though a usable test is there',
      [choose('perceived-exertion')],
      { reasons: ['chosen'], guide: { lower: 82, upper: 92 } },
    ],
  ])('%s', (_case, changes, expected) => {
    expect(answerTo(changes)).toMatchObject(expected);
  });
});

describe('a choice that does not apply', () => {
  it.each<[string, Change[], string, RegExp]>([
    [
      'the reserve without a usable test',
      [choose('heart-rate-reserve'), withoutTest],
      'choice.method',
      /no exercise test/,
    ],
    [
      'a measured maximum without one',
      [choose(null, 'measured'), withoutTest],
      'choice.maximum',
      /no exercise test/,
    ],
    [
      'an estimate beside a usable test',
      [choose(null, 'brawner')],
      'choice.maximum',
      /measured peak/,
    ],
    [
      'an estimate for other patients',
      [choose('heart-rate-reserve', 'tanaka'), withoutTest],
      'choice.maximum',
      /drug is taken/,
    ],
    [
      'percent of an estimate',
      [choose('percent-of-peak', 'fox'), withoutTest],
      'choice.maximum',
      /measured peak only/,
    ],
    [
      'a maximum for observed work',
      [choose('observed-work', 'measured')],
      'choice.maximum',
      /no maximum/,
    ],
    ['a maximum for resting-plus', [choose('resting-plus', 'fox')], 'choice.maximum', /no maximum/],
    [
      'a maximum for effort',
      [choose('perceived-exertion', 'measured')],
      'choice.maximum',
      /no maximum/,
    ],
    ['observed work that nobody saw', [choose('observed-work')], 'choice.method', /observed/],
    [
      'resting-plus in a tracked rhythm',
      [choose('resting-plus'), (i) => (i.rhythm = 'sinus-tracked')],
      'choice.method',
      /sinus rhythm/,
    ],
    [
      'a heart rate that cannot lead',
      [choose('percent-of-peak'), afib],
      'choice.method',
      /cannot lead/,
    ],
    ['its maximum', [choose(null, 'measured'), afib], 'choice.maximum', /cannot lead/],
  ])('%s', (_case, changes, path, message) => {
    const evaluation = evaluatePrescription(prescriptionRequest(...changes), defaultPolicy);
    expect(evaluation).toMatchObject({ ok: false, error: { code: 'not-applicable', path } });
    expect(evaluation.ok ? '' : evaluation.error.message).toMatch(message);
  });
});

describe('the candidates', () => {
  it('stand in one order, every method and every maximum', () => {
    expect(answerTo().candidates.map(({ method, maximum }) => [method, maximum])).toEqual([
      ['heart-rate-reserve', 'measured'],
      ['heart-rate-reserve', 'brawner'],
      ['heart-rate-reserve', 'keteyian'],
      ['heart-rate-reserve', 'tanaka'],
      ['heart-rate-reserve', 'gellish'],
      ['heart-rate-reserve', 'nes'],
      ['heart-rate-reserve', 'fox'],
      ['heart-rate-reserve', 'gulati'],
      ['percent-of-peak', 'measured'],
      ['observed-work', null],
      ['resting-plus', null],
      ['perceived-exertion', null],
    ]);
  });

  it('stand without numbers where they do not apply, each with a reason', () => {
    const { candidates } = answerTo(afib);
    for (const { method, applicable, why, ...numbers } of candidates) {
      expect(applicable).toBe(method === 'perceived-exertion');
      expect(why).not.toBe('');
      expect(numbers).toMatchObject({ maximumValue: null, standardError: null });
      expect(numbers).toMatchObject({ lower: null, upper: null });
    }
  });

  it('are shown however narrow, but never inverted', () => {
    const narrow = answerTo([
      choose('perceived-exertion'),
      (i) => (i.percentOfPeak = { lower: 0.681, upper: 0.684 }),
    ]);
    expect(narrow.candidates[8]).toMatchObject({ lower: null, upper: null, applicable: true });
    const onePoint = answerTo((i) => (i.percentOfPeak = { lower: 0.68, upper: 0.69 }));
    expect(onePoint.candidates[8]).toMatchObject({ lower: 92, upper: 92, applicable: true });
  });
});
