import { defaultPolicy, evaluatePrescription } from '@shared/clinical/prescribing';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';

import { minutesLater } from './days';
import { idAt } from './dice';
import type { RowOf } from './row-of';

/** A prescription with the moments of its life, as they will come. */
export interface IssuedRange {
  readonly id: string;
  readonly inputs: PrescriptionRequestInput;
  readonly answer: PrescriptionAnswer;
  readonly createdAt: Date;
  readonly signedAt: Date;
  /** Null: within the limits of the plan, a physiologist's signature was enough. */
  readonly physicianSignedAt: Date | null;
  readonly activeFrom: Date;
  /** The range in force when it is signed. */
  readonly supersedes: string | null;
}

export interface Signing {
  readonly createdAt: Date;
  readonly signedAt: Date;
  readonly physicianSignedAt: Date | null;
}

/** What the engine made of the inputs. */
export type Evaluated = Pick<IssuedRange, 'inputs' | 'answer'>;

/** The engine's answer by the published policy; a choice that no longer applies is given up, as a clinician would. */
export function evaluate(inputs: PrescriptionRequestInput): Evaluated {
  const evaluation = evaluatePrescription(prescriptionRequestSchema.parse(inputs), defaultPolicy);
  if (evaluation.ok) return { inputs, answer: evaluation.answer };
  if (inputs.choice.method === null && inputs.choice.maximum === null) {
    throw new Error(evaluation.error.message);
  }
  return evaluate({ ...inputs, choice: { method: null, maximum: null } });
}

export function issueRange(
  key: string,
  evaluated: Evaluated,
  signing: Signing,
  supersedes: string | null,
): IssuedRange {
  return {
    id: idAt(signing.createdAt, key, 'prescription'),
    ...evaluated,
    ...signing,
    activeFrom: signing.physicianSignedAt ?? signing.signedAt,
    supersedes,
  };
}

/** A range as a session is held by it. */
export interface StandingRange {
  readonly id: string;
  readonly answer: PrescriptionAnswer;
  /** Why it leads no more; [] while it holds. */
  readonly withdrawn: readonly Withdrawal['reason'][];
}

/** What was charted that the range in force did not rest on. */
export interface Withdrawal {
  readonly at: Date;
  readonly reason: 'drugs' | 'threshold';
}

/** After a change at the chart effort leads, no higher than usual, and the ceiling stays. */
function withdrawn(answer: PrescriptionAnswer): PrescriptionAnswer {
  const { scale, lower, upper } = answer.perceivedExertion;
  return {
    ...answer,
    leadBy: 'perceived-exertion',
    target: null,
    guide: null,
    perceivedExertion: { scale, lower: Math.min(lower, 11), upper: Math.min(upper, 13) },
  };
}

/**
 * The range in force at an instant.
 * @param withdrawal the last one, which holds until another range is in force
 */
export function rangeAt(
  ranges: readonly IssuedRange[],
  at: Date,
  withdrawal: Withdrawal | null,
): StandingRange | null {
  const range = ranges.filter(({ activeFrom }) => activeFrom <= at).at(-1);
  if (!range) return null;
  const { id, answer, activeFrom } = range;
  const isWithdrawn = withdrawal && withdrawal.at <= at && activeFrom <= withdrawal.at;
  return isWithdrawn
    ? { id, answer: withdrawn(answer), withdrawn: [withdrawal.reason] }
    : { id, answer, withdrawn: [] };
}

type PrescriptionRow = RowOf<'prescriptions'>;

export interface RangeOwner {
  readonly patientId: string;
  readonly enrollmentId: string;
  readonly physiologist: string;
  readonly physician: string;
}

type Lifetime = Pick<
  PrescriptionRow,
  'status' | 'version' | 'awaiting' | 'signedAt' | 'physicianSignedAt' | 'activatedAt' | 'endedAt'
>;

/** What has happened to a range by now. One that still waits when its course ends is put aside. */
function lifetime(range: IssuedRange, endsAt: Date | null, now: Date): Lifetime {
  const happened = (at: Date | null) => (at !== null && at <= now ? at : null);
  if (endsAt && endsAt <= now && endsAt <= range.activeFrom) {
    const signedAt = range.signedAt < endsAt ? range.signedAt : null;
    const kept = { awaiting: null, physicianSignedAt: null, activatedAt: null };
    return { status: 'revoked', version: signedAt ? 3 : 2, signedAt, endedAt: endsAt, ...kept };
  }
  const signedAt = happened(range.signedAt);
  const physicianSignedAt = happened(range.physicianSignedAt);
  const activatedAt = happened(range.activeFrom);
  const endedAt = activatedAt && happened(endsAt);
  const steps = [signedAt, physicianSignedAt, endedAt].filter((at) => at !== null).length;
  return {
    status: endedAt ? 'completed' : activatedAt ? 'active' : 'draft',
    version: 1 + steps,
    awaiting: signedAt && !activatedAt ? 'physician' : null,
    signedAt,
    physicianSignedAt,
    activatedAt,
    endedAt,
  };
}

const earlier = (a: Date | null, b: Date | null) => (a && b ? (a < b ? a : b) : (a ?? b));

/**
 * The rows of a person's ranges in the order of issue.
 * @param closesAt when the last one ends with its course; null: it stays in force
 */
export function prescriptionRows(
  ranges: readonly IssuedRange[],
  owner: RangeOwner,
  closesAt: Date | null,
  now: Date,
): PrescriptionRow[] {
  return ranges
    .filter(({ createdAt }) => createdAt <= now)
    .map((range, each) => {
      const life = lifetime(range, earlier(ranges[each + 1]?.activeFrom ?? null, closesAt), now);
      return {
        id: range.id,
        patientId: owner.patientId,
        enrollmentId: owner.enrollmentId,
        inputs: range.inputs,
        result: range.answer,
        policyVersion: range.answer.policyVersion,
        engineVersion: range.answer.engineVersion,
        supersedes: life.signedAt && range.supersedes,
        createdAt: range.createdAt,
        createdBy: owner.physiologist,
        signedBy: life.signedAt ? owner.physiologist : null,
        physicianSignedBy: life.physicianSignedAt ? owner.physician : null,
        ...life,
      };
    });
}

/** A review by one signature: written, and signed ten minutes later. */
export function signedAtOnce(createdAt: Date): Signing {
  return { createdAt, signedAt: minutesLater(createdAt, 10), physicianSignedAt: null };
}
