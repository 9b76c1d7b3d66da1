import { describe, expect, it } from 'vitest';
import { effectOfFact, isReviewDue, prescriptionFacts } from './effect-of-fact';
import type { FactEffect, PrescriptionFact } from './effect-of-fact';
import { defaultPolicy } from './policy';

const expected: Record<PrescriptionFact, FactEffect['effect']> = {
  'rate-acting-drug-started': 'withdrawn',
  'rate-acting-drug-raised': 'withdrawn',
  'rate-acting-drug-lowered': 'withdrawn',
  'rate-acting-drug-changed': 'withdrawn',
  'rate-acting-drug-stopped': 'withdrawn',
  'rhythm-changed': 'withdrawn',
  'device-changed': 'withdrawn',
  'threshold-added': 'withdrawn',
  'cardiac-event': 'withdrawn',
  procedure: 'withdrawn',
  syncope: 'withdrawn',
  'review-days-passed': 'review-due',
  'resting-rate-drifted': 'review-due',
  'walk-test-repeated': 'review-due',
  'exercise-test-repeated': 'review-due',
  'plan-signature-overdue': 'stop',
  'dose-missed-today': 'effort-today',
};

describe('what a fact does to the range in force', () => {
  it.each(prescriptionFacts)('%s', (fact) => {
    const { effect, leadBy, why } = effectOfFact(fact);
    expect(effect).toBe(expected[fact]);
    const effortLeads = effect === 'withdrawn' || effect === 'effort-today';
    expect(leadBy === 'perceived-exertion').toBe(effortLeads);
    expect(why).toMatch(/[.]$/);
  });

  it('counts the days of the policy', () => {
    expect(isReviewDue(29, defaultPolicy)).toBe(false);
    expect(isReviewDue(30, defaultPolicy)).toBe(true);
    expect(isReviewDue(30, { ...defaultPolicy, reviewDueDays: 45 })).toBe(false);
  });
});
