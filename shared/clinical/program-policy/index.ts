export type { PolicyKey } from '../prescribing/policy-keys';
export * from './policy-rules';
export * from './program-policy';
export * from './training-policy';
export * from './range-effect';
