import type { PrescriptionPolicy } from './policy';

/** What may happen to a patient, a plan or a day while a range is in force. */
export const prescriptionFacts = [
  'rate-acting-drug-started',
  'rate-acting-drug-raised',
  'rate-acting-drug-lowered',
  'rate-acting-drug-changed',
  'rate-acting-drug-stopped',
  'rhythm-changed',
  'device-changed',
  'threshold-added',
  'cardiac-event',
  'procedure',
  'syncope',
  'review-days-passed',
  'resting-rate-drifted',
  'walk-test-repeated',
  'exercise-test-repeated',
  'plan-signature-overdue',
  'dose-missed-today',
] as const;
export type PrescriptionFact = (typeof prescriptionFacts)[number];

export interface FactEffect {
  /**
   * - withdrawn: the range is out of force at once
   * - review-due: the range stays in force, and someone looks at it
   * - stop: no exercise until a physician has signed the plan
   * - effort-today: effort leads today alone, without a review
   */
  readonly effect: 'withdrawn' | 'review-due' | 'stop' | 'effort-today';
  /** What leads from then on; null where nobody exercises. */
  readonly leadBy: 'unchanged' | 'perceived-exertion' | null;
  readonly why: string;
}

const withdrawn = (why: string): FactEffect => ({
  effect: 'withdrawn',
  leadBy: 'perceived-exertion',
  why: `${why}: effort leads and the ceiling stays until a new range is signed.`,
});

const reviewDue = (why: string): FactEffect => ({
  effect: 'review-due',
  leadBy: 'unchanged',
  why: `${why}: the range stays in force and is due for review.`,
});

const effects: Readonly<Record<PrescriptionFact, FactEffect>> = {
  'rate-acting-drug-started': withdrawn('A rate-acting drug was started'),
  'rate-acting-drug-raised': withdrawn('The dose of a rate-acting drug was raised'),
  'rate-acting-drug-lowered': withdrawn('The dose of a rate-acting drug was lowered'),
  'rate-acting-drug-changed': withdrawn('A rate-acting drug was changed'),
  'rate-acting-drug-stopped': withdrawn('A rate-acting drug was stopped'),
  'rhythm-changed': withdrawn('The rhythm has changed'),
  'device-changed': withdrawn('A device or its settings have changed'),
  'threshold-added': withdrawn('A new threshold was found'),
  'cardiac-event': withdrawn('A cardiac event has happened'),
  procedure: withdrawn('A procedure was done'),
  syncope: withdrawn('The patient has fainted'),
  'review-days-passed': reviewDue('The days between reviews have passed'),
  'resting-rate-drifted': reviewDue('The resting rate has drifted'),
  'walk-test-repeated': reviewDue('The six-minute walk was repeated'),
  'exercise-test-repeated': reviewDue('The exercise test was repeated'),
  'plan-signature-overdue': {
    effect: 'stop',
    leadBy: null,
    why: "The physician's signature on the plan is overdue: no exercise until the plan is signed.",
  },
  'dose-missed-today': {
    effect: 'effort-today',
    leadBy: 'perceived-exertion',
    why: "Today's dose was missed: effort leads today and the ceiling stays.",
  },
};

/** What a fact does to the range in force. Under every effect the ceiling stays. */
export const effectOfFact = (fact: PrescriptionFact): FactEffect => effects[fact];

/** Whether the policy's days since the last review have passed. */
export const isReviewDue = (daysSinceReview: number, policy: PrescriptionPolicy): boolean =>
  daysSinceReview >= policy.reviewDueDays;
