import { describe, expect, it } from 'vitest';
import { answerTo, withTest, withoutThresholds } from '../../../test/builders/prescription-request';
import type { Change } from '../../../test/builders/prescription-request';
import { bpm } from '../../units';
import { defaultPolicy } from './policy';

const ischemiaAt =
  (heartRate: number): Change =>
  (i) =>
    (i.thresholds = [{ kind: 'ischemia', heartRate, clearMets: null }]);

const intensity =
  (lower: number, upper: number): Change =>
  (i) =>
    (i.intensity = { lower, upper });

describe('the range', () => {
  it.each<[string, Change[], object | null]>([
    [
      'noise of binary fractions does not move an end: 60 + 0.7 × 100 is 130',
      [
        withoutThresholds,
        (i) => (i.resting.seated = 60),
        withTest({ peakHeartRate: 160 }),
        intensity(0.4, 0.7),
      ],
      { lower: 100, upper: 130 },
    ],
    [
      'fractional rates in, whole rates out',
      [withoutThresholds, (i) => (i.resting.seated = 62.5)],
      { lower: 92, upper: 119 },
    ],
    ['cut to the least width', [ischemiaAt(106)], { lower: 91, upper: 96 }],
    ['cut below the least width', [ischemiaAt(105)], null],
    ['cut below its lower end', [ischemiaAt(90)], null],
    ['narrow without any ceiling', [withoutThresholds, intensity(0.4, 0.44)], null],
  ])('%s', (_case, changes, target) => {
    const answer = answerTo(changes);
    expect(answer.target).toEqual(target);
    expect(answer.reasons).toEqual(target === null ? ['no-valid-range'] : []);
  });

  it('without useful width gives effort the lead and withholds work', () => {
    const answer = answerTo(ischemiaAt(105));
    expect(answer).toMatchObject({
      leadBy: 'perceived-exertion',
      guide: null,
      maximum: null,
      perceivedExertion: { lower: 9, upper: 11 },
      targetVo2: null,
      targetMets: null,
      workloads: [],
    });
    expect(answer.workCeilingMets).not.toBeNull();
    expect(answer.cautions.slice(0, 2).map(({ code }) => code)).toEqual([
      'no-valid-range',
      'ceiling-below-intensity',
    ]);
  });

  it('blames the ceiling only when the ceiling cuts', () => {
    const codes = answerTo([withoutThresholds, intensity(0.4, 0.44)]).cautions.map(
      ({ code }) => code,
    );
    expect(codes).not.toContain('ceiling-below-intensity');
    const equal = answerTo(ischemiaAt(129));
    expect(equal.target).toEqual({ lower: 91, upper: 119 });
    expect(equal.cautions.map(({ code }) => code)).not.toContain('ceiling-below-intensity');
    expect(equal.patientTarget).toEqual({ lower: 91, upper: 116 });
  });

  it('takes the least width from the policy', () => {
    const policy = { ...defaultPolicy, range: { minimumWidth: bpm(20) } };
    expect(answerTo([], policy).target).toBeNull();
  });
});

describe('what the patient is told', () => {
  it('has no count when ten seconds hold no whole beat of the range', () => {
    const answer = answerTo([withoutThresholds, intensity(0.4, 0.49)]);
    expect(answer.target).toEqual({ lower: 91, upper: 97 });
    expect(answer.tenSecondCount).toEqual({ lower: 16, upper: 16 });
    const binding = answerTo([ischemiaAt(107)]);
    expect(binding.target).toEqual({ lower: 91, upper: 97 });
    expect(binding.tenSecondCount).toBeNull();
    expect(binding.patientTarget).toEqual({ lower: 91, upper: 94 });
  });
});

describe('the guide', () => {
  const noTest: Change = (i) => (i.test = null);

  it.each<[string, Change[], object | null]>([
    ['the seated rate plus 20 to 30', [], { lower: 82, upper: 92 }],
    [
      'the standing rate before the seated',
      [(i) => (i.resting.standing = 70)],
      { lower: 90, upper: 100 },
    ],
    ['cut at the ceiling', [ischemiaAt(98)], { lower: 82, upper: 88 }],
    ['none when cut too narrow', [ischemiaAt(96)], null],
    ['none at a seated rate of 100', [(i) => (i.resting.seated = 100)], null],
    [
      'none where the cap meets the lower end',
      [withoutThresholds, (i) => (i.resting.standing = 105)],
      null,
    ],
    [
      'none with a reduced ejection fraction',
      [(i) => (i.conditions.heartFailure = 'reduced')],
      null,
    ],
    ['none with heart failure unknown', [(i) => (i.conditions.heartFailure = 'unknown')], null],
    [
      'with a preserved ejection fraction',
      [(i) => (i.conditions.heartFailure = 'preserved')],
      { lower: 82, upper: 92 },
    ],
    [
      'with a mildly reduced one',
      [(i) => (i.conditions.heartFailure = 'mildly-reduced')],
      { lower: 82, upper: 92 },
    ],
    ['none with autonomic neuropathy', [(i) => (i.conditions.autonomicNeuropathy = true)], null],
    ['none in tracked sinus rhythm', [(i) => (i.rhythm = 'sinus-tracked')], null],
    [
      'none where heart rate cannot lead',
      [(i) => (i.conditions.chronotropicIncompetence = true)],
      null,
    ],
  ])('%s', (_case, changes, guide) => {
    const answer = answerTo([noTest, ...changes]);
    expect(answer.guide).toEqual(guide);
    const codes = answer.cautions.map(({ code }) => code);
    expect(codes.includes('resting-plus-underdoses')).toBe(guide !== null);
  });
});
