import type { PrescriptionAnswer } from '../prescribing/answer';
import { evaluatePrescription } from '../prescribing/evaluate-prescription';
import type { PrescriptionPolicy } from '../prescribing/policy';
import type { ExertionRange, PrescriptionRequest } from '../prescribing/request';

/** What of a prescription another policy may change, in the order of weight. */
export const effectParts = ['range', 'ceiling', 'effort', 'ask-line', 'work', 'limits'] as const;
export type EffectPart = (typeof effectParts)[number];

/** What a range is read by: rates in bpm, effort on Borg 6–20. */
export interface RangeInBrief extends Pick<
  PrescriptionAnswer,
  'leadBy' | 'target' | 'guide' | 'askLine'
> {
  readonly perceivedExertion: ExertionRange;
  readonly ceiling: number | null;
}

export interface RangeEffect {
  readonly parts: readonly EffectPart[];
  /** Null when the method or maximum that was chosen would not apply any more. */
  readonly after: RangeInBrief | null;
  /** Why `after` is null. */
  readonly why: string | null;
}

const partOf = (part: EffectPart, answer: PrescriptionAnswer): unknown => {
  switch (part) {
    case 'range':
      return [answer.leadBy, answer.target, answer.guide];
    case 'ceiling':
      return answer.ceiling?.value ?? null;
    case 'effort':
      return answer.perceivedExertion;
    case 'ask-line':
      return answer.askLine;
    case 'work':
      return [answer.workCeilingMets, answer.targetMets, answer.workloads];
    case 'limits':
      return [answer.pressureCeiling, answer.oxygenFloor];
  }
};

export function inBrief(answer: PrescriptionAnswer): RangeInBrief {
  const { leadBy, target, guide, askLine, ceiling } = answer;
  const { lower, upper } = answer.perceivedExertion;
  const perceivedExertion = { lower, upper };
  return { leadBy, target, guide, askLine, perceivedExertion, ceiling: ceiling?.value ?? null };
}

/**
 * What a proposed policy would make of the facts that a prescription was signed with, against the present policy.
 * @returns null when it changes nothing that one reads
 */
export function rangeEffect(
  inputs: PrescriptionRequest,
  present: PrescriptionPolicy,
  proposed: PrescriptionPolicy,
): RangeEffect | null {
  const before = evaluatePrescription(inputs, present);
  const after = evaluatePrescription(inputs, proposed);
  if (!after.ok) {
    const why = after.error.message;
    return before.ok ? { parts: ['range'], after: null, why } : null;
  }
  const parts = before.ok
    ? effectParts.filter(
        (part) =>
          JSON.stringify(partOf(part, before.answer)) !==
          JSON.stringify(partOf(part, after.answer)),
      )
    : (['range'] as const);
  return parts.length === 0 ? null : { parts, after: inBrief(after.answer), why: null };
}
