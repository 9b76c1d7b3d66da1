import { describe, expect, it } from 'vitest';
import {
  answerTo,
  prescriptionRequest,
  withTest,
  withoutTest,
} from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';
import { evaluatePrescription } from './evaluate-prescription';
import { defaultPolicy } from './policy';
import type { MaximumMethod } from './request';

const healthy = ['tanaka', 'gellish', 'nes', 'fox'];
const noDrugs: Change = (i) => (i.rateActingDrugs = []);

function applicableMaxima(...changes: Change[]): (MaximumMethod | null)[] {
  return answerTo(changes)
    .candidates.filter(({ method }) => method === 'heart-rate-reserve')
    .filter(({ applicable }) => applicable)
    .map(({ maximum }) => maximum);
}

describe('which maxima apply', () => {
  it.each<[string, Change[], string[]]>([
    ['a usable test: the measured peak alone', [], ['measured']],
    ['coronary disease on a beta blocker', [withoutTest], ['brawner']],
    ['no rate-acting drug, a man', [withoutTest, noDrugs], healthy],
    [
      'no rate-acting drug, a woman',
      [withoutTest, noDrugs, (i) => (i.patient.sexAtBirth = 'female')],
      [...healthy, 'gulati'],
    ],
    [
      'no rate-acting drug, sex unknown',
      [withoutTest, noDrugs, (i) => (i.patient.sexAtBirth = 'unknown')],
      healthy,
    ],
    ['drugs unknown', [withoutTest, (i) => (i.rateActingDrugs = null)], []],
    ['another rate-acting drug', [withoutTest, (i) => (i.rateActingDrugs = ['digoxin'])], []],
    [
      'autonomic neuropathy',
      [withoutTest, noDrugs, (i) => (i.conditions.autonomicNeuropathy = true)],
      [],
    ],
    ['40 years', [withoutTest, (i) => (i.patient.ageYears = 40)], ['brawner']],
    ['39.9 years', [withoutTest, (i) => (i.patient.ageYears = 39.9)], []],
    ['80 years', [withoutTest, (i) => (i.patient.ageYears = 80)], ['brawner']],
    ['80.1 years', [withoutTest, (i) => (i.patient.ageYears = 80.1)], []],
    [
      'preserved ejection fraction',
      [withoutTest, (i) => (i.conditions.heartFailure = 'preserved')],
      ['brawner'],
    ],
    [
      'mildly reduced ejection fraction',
      [withoutTest, (i) => (i.conditions.heartFailure = 'mildly-reduced')],
      [],
    ],
    [
      'reduced ejection fraction',
      [withoutTest, (i) => (i.conditions.heartFailure = 'reduced')],
      ['keteyian'],
    ],
    ['heart failure unknown', [withoutTest, (i) => (i.conditions.heartFailure = 'unknown')], []],
    ['no coronary disease', [withoutTest, (i) => (i.conditions.coronaryDisease = false)], []],
    ['tracked sinus rhythm', [withoutTest, (i) => (i.rhythm = 'sinus-tracked')], []],
    ['atrial fibrillation', [withoutTest, noDrugs, (i) => (i.rhythm = 'atrial-fibrillation')], []],
  ])('%s', (_case, changes, expected) => {
    expect(applicableMaxima(...changes)).toEqual(expected);
  });

  it.each<[MaximumMethod, number, number | null]>([
    ['tanaka', 163.2, 11.4],
    ['gellish', 162.2, null],
    ['nes', 170.04, 10.8],
    ['fox', 156, 12.4],
    ['gulati', 149.68, null],
  ])('%s at 64 years', (maximum, value, standardError) => {
    const { candidates } = answerTo([
      withoutTest,
      noDrugs,
      (i) => (i.patient.sexAtBirth = 'female'),
    ]);
    const candidate = candidates.find((row) => row.maximum === maximum);
    expect(candidate?.maximumValue).toBeCloseTo(value, 9);
    expect(candidate?.standardError).toBe(standardError);
    expect(candidate?.lower).toBe(Math.ceil(62 + 0.4 * (value - 62)));
    expect(candidate?.upper).toBe(Math.floor(62 + 0.8 * (value - 62)));
  });

  it.each<[string, Change, number]>([
    ['no test', withoutTest, 118],
    ['a treadmill test', withTest({ mode: 'treadmill', eventSince: true }), 118],
    ['an arm test', withTest({ mode: 'arm', eventSince: true }), 118],
    ['a cycle test', withTest({ mode: 'cycle', eventSince: true }), 113],
  ])('Keteyian after %s', (_case, change, value) => {
    const { maximum } = answerTo([
      change,
      (i) => (i.conditions.heartFailure = 'reduced'),
      (i) => (i.choice.maximum = 'keteyian'),
    ]);
    expect(maximum).toEqual({ method: 'keteyian', value, standardError: 18 });
  });

  it('leads by an estimate only when it is chosen, with a caution', () => {
    expect(answerTo([withoutTest, noDrugs]).leadBy).toBe('perceived-exertion');
    const answer = answerTo([withoutTest, noDrugs, (i) => (i.choice.maximum = 'tanaka')]);
    expect(answer).toMatchObject({
      leadBy: 'heart-rate',
      method: 'heart-rate-reserve',
      reasons: [],
      outerLimit: null,
      target: { lower: 103, upper: 108 },
    });
    expect(answer.cautions.map(({ code }) => code)).toContain('estimated-maximum');
  });

  it('finds no range on an estimate below the resting rate', () => {
    const changes: Change[] = [
      withoutTest,
      (i) => (i.thresholds = []),
      (i) => (i.patient.ageYears = 80),
      (i) => (i.resting.seated = 115),
      (i) => (i.choice.maximum = 'brawner'),
    ];
    const evaluation = evaluatePrescription(prescriptionRequest(...changes), defaultPolicy);
    expect(evaluation).toMatchObject({
      ok: true,
      answer: { target: null, reasons: ['no-valid-range'] },
    });
    const candidate = evaluation.ok ? evaluation.answer.candidates[1] : undefined;
    expect(candidate).toMatchObject({ applicable: true, lower: null, upper: null });
  });
});
