export { evaluatePrescription, engineVersion } from './evaluate-prescription';
export { effectOfFact } from './effect-of-fact';
export * from './answer';
export * from './policy';
export * from './policy-keys';
export * from './request';
export * from './request-bounds';
