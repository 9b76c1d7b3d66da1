export { evaluatePrescription, engineVersion } from './evaluate-prescription';
export { effectOfFact, isReviewDue, prescriptionFacts } from './effect-of-fact';
export type { FactEffect, PrescriptionFact } from './effect-of-fact';
export { reasonWords } from './can-lead';
export * from './answer';
export * from './policy';
export * from './request';
export * from './request-bounds';
