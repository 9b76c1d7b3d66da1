import { effectOfFact, type FactEffect, type PrescriptionFact } from './prescribing/effect-of-fact';
import type { WithdrawalReason } from './withdrawal';

/** One cause that touches the range in force: what was saved, by whom and when. */
export interface RangeFlag {
  readonly fact: PrescriptionFact;
  readonly effect: FactEffect['effect'];
  /** Of what exactly: the drug and its dose, the rhythm, the kind of event …; null where the fact says it all. */
  readonly detail: string | null;
  /** ISO 8601. */
  readonly at: string;
  /** Null where nobody did it: days that have passed. */
  readonly by: string | null;
}

/** Each fact in words that stand alone. */
export const factWords: Readonly<Record<PrescriptionFact, string>> = {
  'rate-acting-drug-started': 'Rate-acting drug started',
  'rate-acting-drug-raised': 'Rate-acting drug raised',
  'rate-acting-drug-lowered': 'Rate-acting drug lowered',
  'rate-acting-drug-changed': 'Rate-acting drug changed',
  'rate-acting-drug-stopped': 'Rate-acting drug stopped',
  'rhythm-changed': 'Rhythm changed',
  'device-changed': 'Device reprogrammed',
  'threshold-added': 'New threshold',
  'cardiac-event': 'Cardiac event',
  procedure: 'Procedure',
  syncope: 'Syncope',
  'review-days-passed': 'Days of review have passed',
  'resting-rate-drifted': 'Resting rate drifted',
  'walk-test-repeated': 'New six-minute walk',
  'exercise-test-repeated': 'New exercise test',
  'plan-signature-overdue': 'Signature on the plan overdue',
  'dose-missed-today': 'Today’s dose was missed',
};

const reasons: Partial<Readonly<Record<PrescriptionFact, WithdrawalReason>>> = {
  'rate-acting-drug-started': 'drugs',
  'rate-acting-drug-raised': 'drugs',
  'rate-acting-drug-lowered': 'drugs',
  'rate-acting-drug-changed': 'drugs',
  'rate-acting-drug-stopped': 'drugs',
  'rhythm-changed': 'rhythm',
  'device-changed': 'device',
  'threshold-added': 'threshold',
  'cardiac-event': 'event',
  procedure: 'event',
  syncope: 'event',
};

/** Why a range is out of force by these flags, each reason once; [] while it holds. */
export const withdrawalReasonsOf = (flags: readonly RangeFlag[]): WithdrawalReason[] => [
  ...new Set(flags.flatMap(({ fact }) => reasons[fact] ?? [])),
];

export const isReviewFlag = ({ effect }: RangeFlag): boolean => effect === 'review-due';
export const isTodayFlag = ({ effect }: RangeFlag): boolean => effect === 'effort-today';

const amount = /^\s*(\d+(?:\.\d+)?)\s*(mg|mcg|µg|g)\b/i;

/** Whether a dose went up or down; `changed` where the two cannot be told apart by their numbers, in the same unit. */
export function doseChange(
  before: string | null,
  after: string,
): 'rate-acting-drug-raised' | 'rate-acting-drug-lowered' | 'rate-acting-drug-changed' {
  const [was, is] = [amount.exec(before ?? ''), amount.exec(after)];
  const sameUnit = was?.[2]?.toLowerCase() === is?.[2]?.toLowerCase();
  if (!was || !is || !sameUnit || was[1] === is[1]) return 'rate-acting-drug-changed';
  return Number(is[1]) > Number(was[1]) ? 'rate-acting-drug-raised' : 'rate-acting-drug-lowered';
}

export const effectOf = (fact: PrescriptionFact): FactEffect['effect'] => effectOfFact(fact).effect;
