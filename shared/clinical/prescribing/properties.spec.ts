import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyPrescriptionInput } from '../../../test/builders/prescription-request-arbitrary';
import {
  prescriptionAnswerSchema,
  prescriptionRequestSchema,
} from '../../contracts/prescriptions-contract';
import type { PrescriptionRequestInput } from '../../contracts/prescriptions-contract';
import type { HeartRateRange, PrescriptionAnswer } from './index';
import { defaultPolicy, evaluatePrescription, maximumMethods, methods } from './index';

const noise = 1e-9;

/** Often the choice of the rules, else any, whether or not it applies. */
const anyChoice = fc.oneof(
  { weight: 3, arbitrary: fc.constant({ method: null, maximum: null }) },
  fc.record({ method: fc.constantFrom(...methods), maximum: fc.constant(null) }),
  fc.record({ method: fc.constant(null), maximum: fc.constantFrom(...maximumMethods) }),
);

function evaluate(input: PrescriptionRequestInput): PrescriptionAnswer | null {
  const evaluation = evaluatePrescription(prescriptionRequestSchema.parse(input), defaultPolicy);
  return evaluation.ok ? evaluation.answer : null;
}

/** Every answer that some choice gives to any request. */
function always(check: (answer: PrescriptionAnswer, input: PrescriptionRequestInput) => void) {
  fc.assert(
    fc.property(anyPrescriptionInput, anyChoice, (proposed, choice) => {
      const input = { ...proposed, choice };
      const answer = evaluate(input);
      if (answer !== null) check(answer, input);
    }),
    { numRuns: 1500 },
  );
}

const rangesOf = ({ target, guide, patientTarget, workloads }: PrescriptionAnswer) => [
  target,
  guide,
  patientTarget,
  ...workloads.map((row) => (row.modality === 'arm' ? row.target : null)),
];

describe('whatever the request', () => {
  it('heart rate leads often enough for the rest to mean something', () => {
    const answers = fc.sample(anyPrescriptionInput, { numRuns: 500, seed: 36 }).map(evaluate);
    const led = answers.filter((answer) => answer?.leadBy === 'heart-rate');
    expect(led.length).toBeGreaterThan(60);
  });

  it('no target, guide or arm range lies above the ceiling', () => {
    always((answer) => {
      for (const range of rangesOf(answer)) {
        if (range === null) continue;
        expect(range.lower).toBeLessThanOrEqual(range.upper);
        if (answer.ceiling) expect(range.upper).toBeLessThanOrEqual(answer.ceiling.value);
      }
    });
  });

  it('no ceiling lies above any limit, and a limit exists only with a ceiling', () => {
    always(({ ceiling, limits }) => {
      expect(ceiling === null).toBe(limits.length === 0);
      for (const { value, threshold, margin } of limits) {
        expect(ceiling?.value).toBeLessThanOrEqual(value);
        expect(value).toBeLessThanOrEqual(threshold - margin + 1e-6);
      }
    });
  });

  it('no work lies above the work ceiling, and no setting above its point', () => {
    always(({ workCeilingMets, targetMets, targetVo2, workloads }) => {
      if (targetMets === null || targetVo2 === null) return;
      const highest = workCeilingMets ?? Infinity;
      expect(targetMets.upper).toBeLessThanOrEqual(highest);
      expect(targetVo2.upper / 3.5).toBeLessThanOrEqual(highest + noise);
      expect(targetMets.lower).toBeLessThanOrEqual(targetMets.upper);
      for (const { point, mets } of workloads) {
        const most = point === 'start' ? targetMets.lower : targetMets.upper;
        expect(mets ?? 0).toBeLessThanOrEqual(most + noise);
      }
    });
  });

  it('no work row is zero or negative, and an empty one says why', () => {
    always(({ workloads }) => {
      for (const { mets, withinEquationRange, why } of workloads) {
        if (mets === null) expect(why).not.toBeNull();
        else expect(mets).toBeGreaterThan(0);
        if (mets !== null) expect(withinEquationRange).toBe(true);
      }
    });
  });

  it('rounding never widens a reserve range', () => {
    always(({ candidates, intensity }, { resting: { seated } }) => {
      for (const { method, maximumValue, lower, upper } of candidates) {
        if (method !== 'heart-rate-reserve' || maximumValue === null || lower === null) continue;
        const reserve = maximumValue - seated;
        expect(lower).toBeGreaterThanOrEqual(seated + intensity.lower * reserve - 1e-6);
        expect(upper).toBeLessThanOrEqual(seated + intensity.upper * reserve + 1e-6);
        expect([lower, upper].every(Number.isInteger)).toBe(true);
      }
    });
  });

  it('effort lies on its scale and leads exactly when there is no target', () => {
    always(({ perceivedExertion, leadBy, target, reasons, method, maximum, askLine }) => {
      expect(perceivedExertion.lower).toBeGreaterThanOrEqual(9);
      expect(perceivedExertion.upper).toBeLessThanOrEqual(17);
      expect(perceivedExertion.lower).toBeLessThanOrEqual(perceivedExertion.upper);
      expect(leadBy === 'heart-rate').toBe(target !== null);
      expect(reasons.length > 0).toBe(target === null);
      if (target === null) {
        expect([method, maximum, askLine]).toEqual(['perceived-exertion', null, null]);
      }
    });
  });

  it('the answer fits its contract, every key of it, through JSON and back', () => {
    always((answer) => {
      const json: unknown = JSON.parse(JSON.stringify(answer));
      expect(prescriptionAnswerSchema.parse(json)).toEqual(answer);
    });
  });

  it('the same inputs give the same answer, and stay as they were', () => {
    fc.assert(
      fc.property(anyPrescriptionInput, (input) => {
        const request = prescriptionRequestSchema.parse(input);
        const before = structuredClone(request);
        const first = evaluatePrescription(request, defaultPolicy);
        expect(evaluatePrescription(structuredClone(request), defaultPolicy)).toEqual(first);
        expect(request).toEqual(before);
      }),
    );
  });

  it('an unknown key is refused wherever it stands', () => {
    const places = ['patient', 'resting', 'conditions', 'devices', 'choice'] as const;
    fc.assert(
      fc.property(anyPrescriptionInput, fc.constantFrom(null, ...places), (input, place) => {
        Object.assign(place === null ? input : input[place], { note: 1 });
        expect(prescriptionRequestSchema.safeParse(input).success).toBe(false);
      }),
    );
  });
});

/** What a fact becomes when nobody knows it. */
const forgotten: readonly ((input: PrescriptionRequestInput) => void)[] = [
  (i) => (i.rateActingDrugs = null),
  (i) => (i.devices.icd = { status: 'unknown', zones: [] }),
  (i) => (i.conditions.heartFailure = 'unknown'),
  (i) => (i.patient.sexAtBirth = 'unknown'),
  (i) => (i.risk = 'unknown'),
];

const isWithin = (inner: HeartRateRange, outer: HeartRateRange) =>
  inner.lower >= outer.lower && inner.upper <= outer.upper;

describe('an unknown fact never widens', () => {
  it('the range of any method that it leaves applicable', () => {
    fc.assert(
      fc.property(anyPrescriptionInput, fc.constantFrom(...forgotten), (input, forget) => {
        const known = evaluate(input);
        const changed = structuredClone(input);
        forget(changed);
        const unknown = evaluate(changed);
        unknown?.candidates.forEach(({ applicable, lower, upper }, index) => {
          const before = known?.candidates[index];
          if (!applicable || lower === null || upper === null) return;
          expect(before?.applicable).toBe(true);
          if (before && before.lower !== null && before.upper !== null) {
            const outer = { lower: before.lower, upper: before.upper } as HeartRateRange;
            expect(isWithin({ lower, upper }, outer)).toBe(true);
          }
        });
      }),
      { numRuns: 1500 },
    );
  });

  it('the lead: effort that led with the fact leads without it', () => {
    fc.assert(
      fc.property(anyPrescriptionInput, fc.constantFrom(...forgotten), (input, forget) => {
        if (evaluate(input)?.leadBy !== 'perceived-exertion') return;
        const changed = structuredClone(input);
        forget(changed);
        expect(evaluate(changed)?.leadBy).toBe('perceived-exertion');
      }),
      { numRuns: 1500 },
    );
  });
});
