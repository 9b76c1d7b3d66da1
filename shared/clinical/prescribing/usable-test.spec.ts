import { describe, expect, it } from 'vitest';
import { answerTo, withTest, withoutThresholds } from '../../../test/builders/prescription-request';
import type { TestInput } from '../../../test/builders/prescription-request';
import { testEndings } from './request';

const cardiac = ['fatigue', 'dyspnea', 'angina', 'st-change', 'arrhythmia', 'blood-pressure'];

describe('a usable test', () => {
  it.each(testEndings)('ended by %s counts only when the heart ended it', (endedBy) => {
    const answer = answerTo(withTest({ endedBy }));
    const usable = cardiac.includes(endedBy);
    expect(answer.outerLimit).toBe(usable ? 134 : null);
    expect(answer.leadBy).toBe(usable ? 'heart-rate' : 'perceived-exertion');
    expect(answer.cautions.some(({ code }) => code === 'test-not-usable')).toBe(!usable);
    expect(answer.targetVo2 !== null).toBe(usable);
  });

  it.each<[string, Partial<TestInput>, boolean]>([
    ['on its last valid day', { daysAgo: 180 }, true],
    ['a moment past its last valid day', { daysAgo: 180.5 }, false],
    ['with other rate-acting drugs or doses', { sameRateActingDrugs: false }, false],
    ['with another rhythm or device setting', { sameRhythmAndDevice: false }, false],
    ['before a cardiac event', { eventSince: true }, false],
  ])('%s', (_case, change, usable) => {
    expect(answerTo(withTest(change)).outerLimit).toBe(usable ? 134 : null);
  });

  it('says in the caution why it does not serve', () => {
    const answer = answerTo(withTest({ sameRateActingDrugs: false }));
    const caution = answer.cautions.find(({ code }) => code === 'test-not-usable');
    expect(caution).toMatchObject({ severity: 'warn' });
    expect(caution?.message).toContain('drug');
    expect(answer.reasons).toEqual(['no-usable-test']);
  });

  it.each<[string, Partial<TestInput>]>([
    ['drugs changed', { sameRateActingDrugs: false }],
    ['rhythm changed', { sameRhythmAndDevice: false }],
  ])('still tells the work when only the %s', (_case, change) => {
    const answer = answerTo([withTest(change), withoutThresholds]);
    expect(answer.targetVo2?.lower).toBeCloseTo(11.06, 9);
    expect(answer.targetVo2?.upper).toBeCloseTo(3.5 + 0.8 * 18.9, 9);
  });

  it('tells no work without a peak of uptake, and prefers VO2 to METs', () => {
    expect(answerTo(withTest({ peakVo2: null })).targetVo2).toBeNull();
    const both = answerTo([withTest({ peakMets: 10 }), withoutThresholds]);
    expect(both.targetVo2?.upper).toBeCloseTo(3.5 + 0.8 * 18.9, 9);
    const metsOnly = answerTo([withTest({ peakVo2: null, peakMets: 6.4 }), withoutThresholds]);
    expect(metsOnly.targetMets?.upper).toBeCloseTo(1 + 0.8 * 5.4, 9);
  });
});
