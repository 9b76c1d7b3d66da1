import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FrequencyAnswer } from './answers';
import { scoreDasi } from './dasi';
import { scoreGad7 } from './gad-7';
import type { Questionnaire } from './questionnaires';
import { questionnaires } from './questionnaires';
import { scorePhq2 } from './phq-2';
import { isPhq9Positive, scorePhq9 } from './phq-9';
import { judgeScoreChange } from './score-change';

const answer = fc.option(fc.constantFrom<FrequencyAnswer>(0, 1, 2, 3), { freq: 4 });
const answersOf = (items: number) => fc.array(answer, { minLength: items, maxLength: items });
const missing = (answers: readonly unknown[]) => answers.filter((each) => each === null).length;

describe('PHQ-9', () => {
  it('fills up to two missing items, and says so', () => {
    expect(scorePhq9([2, 2, 2, 2, 2, 1, 1, 0, null])).toEqual({
      state: 'prorated',
      missing: [9],
      estimate: 13.5,
      total: 14,
      band: 'moderate',
      selfHarm: 'ask',
    });
    expect(scorePhq9([2, 2, 2, 2, 2, 1, null, null, null])).toEqual({
      state: 'incomplete',
      missing: [7, 8, 9],
      selfHarm: 'ask',
    });
  });

  it.each<[FrequencyAnswer | null, string]>([
    [0, 'none'],
    [1, 'follow-up-today'],
    [3, 'follow-up-today'],
    [null, 'ask'],
  ])('flags item 9 of %s: %s, with and without a score', (item9, flag) => {
    expect(scorePhq9([0, 0, 0, 0, 0, 0, 0, 0, item9]).selfHarm).toBe(flag);
    expect(scorePhq9([null, null, null, null, 0, 0, 0, 0, item9]).selfHarm).toBe(flag);
  });

  it('is complete only when it is', () => {
    fc.assert(
      fc.property(answersOf(9), (answers) => {
        const score = scorePhq9(answers);
        const gaps = missing(answers);
        expect(score.state).toBe(gaps === 0 ? 'complete' : gaps <= 2 ? 'prorated' : 'incomplete');
        if (score.state === 'incomplete') expect(isPhq9Positive(score)).toBeNull();
        else expect(score.total).toBeLessThanOrEqual(27);
      }),
    );
  });

  it.each([[[0, 0]], [[0, 0, 0, 0, 0, 0, 0, 0, 4]], [[0, 0, 0, 0, 0, 0, 0, 0, 0.5]]])(
    'refuses %o',
    (answers) => {
      expect(() => scorePhq9(answers as FrequencyAnswer[])).toThrow(RangeError);
    },
  );
});

describe('PHQ-2, GAD-7 and DASI', () => {
  it('have no score with a gap', () => {
    fc.assert(
      fc.property(answersOf(2), answersOf(7), (two, seven) => {
        expect(scorePhq2(two).state).toBe(missing(two) === 0 ? 'complete' : 'incomplete');
        expect(scoreGad7(seven).state).toBe(missing(seven) === 0 ? 'complete' : 'incomplete');
      }),
    );
    expect(scoreDasi([...Array<boolean>(11).fill(true), null])).toEqual({
      state: 'incomplete',
      missing: [12],
    });
    expect(() => scoreDasi([true])).toThrow(RangeError);
  });

  it('have bands', () => {
    expect(scorePhq2([1, 1])).toMatchObject({ total: 2, band: 'negative' });
    expect(scoreGad7([3, 3, 3, 3, 3, 3, 3])).toMatchObject({ total: 21, band: 'severe' });
  });

  it('never estimate outside 9.6 to 34.6 mL/kg/min by DASI', () => {
    fc.assert(
      fc.property(fc.array(fc.boolean(), { minLength: 12, maxLength: 12 }), (answers) => {
        const score = scoreDasi(answers);
        if (score.state === 'incomplete') throw new Error('no gap was given');
        expect(score.peakVo2).toBeGreaterThanOrEqual(9.6);
        expect(score.peakVo2).toBeLessThanOrEqual(34.63);
      }),
    );
  });
});

describe('the forms', () => {
  it('have as many items as the scores expect, and reach their highest total', () => {
    const all = <A>(key: keyof typeof questionnaires, answer: A) =>
      Array<A>(questionnaires[key].items.length).fill(answer);
    expect(scorePhq2(all<FrequencyAnswer>('phq-2', 3))).toMatchObject({ total: 6 });
    expect(scorePhq9(all<FrequencyAnswer>('phq-9', 3))).toMatchObject({ total: 27 });
    expect(scoreGad7(all<FrequencyAnswer>('gad-7', 3))).toMatchObject({ total: 21 });
    expect(scoreDasi(all('dasi', true), 'united-kingdom')).toMatchObject({
      total: 58.2,
      version: 'united-kingdom',
    });
    expect(Object.values(questionnaires).map(({ highest }) => highest)).toEqual([6, 27, 21, 58.2]);
    const forms: readonly Questionnaire[] = Object.values(questionnaires);
    for (const { items, source } of forms) expect([...items, source]).not.toContain('');
  });
});

describe('a change of score', () => {
  it.each<[number, number, string, boolean, boolean]>([
    [14, 14, 'same', false, false],
    [14, 10, 'better', false, false],
    [14, 9, 'better', true, false],
    [14, 8, 'better', true, true],
    [8, 14, 'worse', true, true],
  ])('of PHQ-9 from %i to %i', (first, last, direction, important, reliable) => {
    expect(judgeScoreChange('phq-9', first, last)).toEqual({
      change: last - first,
      direction,
      important,
      reliable,
    });
  });
});
