import { describe, expect, it } from 'vitest';
import { answerTo } from '../../../test/builders/prescription-request';

/** Each number was worked by hand from the rules. */
describe('the worked example', () => {
  const answer = answerTo();

  it('leads by the reserve of the measured peak', () => {
    expect(answer).toMatchObject({
      leadBy: 'heart-rate',
      method: 'heart-rate-reserve',
      maximum: { method: 'measured', value: 134, standardError: null },
      reasons: [],
      policyVersion: 1,
      engineVersion: '1.0.0',
    });
  });

  it('works from 62 + 0.40 × 72 = 90.8, up, to 62 + 0.80 × 72 = 119.6, down, cut at 118 − 10', () => {
    expect(answer.candidates[0]).toMatchObject({ lower: 91, upper: 119, applicable: true });
    expect(answer.target).toEqual({ lower: 91, upper: 108 });
    expect(answer.ceiling).toEqual({ value: 108, bindingLimits: ['ischemia'] });
    expect(answer.limits).toMatchObject([
      { kind: 'ischemia', threshold: 118, margin: 10, value: 108 },
    ]);
    expect(answer).toMatchObject({ outerLimit: 134, askLine: null, guide: null });
  });

  it('leaves (108 − 62) / 72 of the reserve, so effort is 11–14', () => {
    expect(answer.intensityAtCeiling).toBe(0.6388888888888888);
    expect(answer.perceivedExertion).toEqual({ scale: 'borg-6-20', lower: 11, upper: 14 });
  });

  it('tells the patient 91–105 and 16–17 beats in ten seconds', () => {
    expect(answer.patientTarget).toEqual({ lower: 91, upper: 105 });
    expect(answer.tenSecondCount).toEqual({ lower: 16, upper: 17 });
  });

  it('asks for 3.5 + 0.4 × 18.9 to 3.5 + 0.638889 × 18.9 of oxygen uptake', () => {
    expect(answer.targetVo2?.lower).toBeCloseTo(11.06, 9);
    expect(answer.targetVo2?.upper).toBeCloseTo(15.575, 9);
    expect(answer.targetMets?.lower).toBeCloseTo(3.16, 9);
    expect(answer.targetMets?.upper).toBeCloseTo(4.45, 9);
    expect(answer.workCeilingMets).toBeCloseTo(4.45, 9);
  });

  it('starts the treadmill at 2.8 mph, level', () => {
    const [start] = answer.workloads;
    expect(start).toMatchObject({
      modality: 'treadmill-walk',
      point: 'start',
      speedMph: 2.8,
      gradePercent: 0,
      withinEquationRange: true,
      why: null,
    });
    expect(start).toHaveProperty('speedMetersPerMinute', expect.closeTo(75.10272, 9));
    expect(start?.mets).toBeCloseTo(3.145792, 9);
  });

  it('warns that the ceiling cuts, and defers', () => {
    expect(answer.cautions.map(({ code, severity }) => [code, severity])).toEqual([
      ['ceiling-below-intensity', 'warn'],
      ['equation-out-of-range', 'note'],
      ['defer-to-local-policy', 'note'],
    ]);
  });
});
