import { describe, expect, it } from 'vitest';
import type { PolicyNumbers } from '../policy-numbers';
import { policyFaults } from '../policy-numbers';
import { defaultIntermittentPolicy, intermittentNumbers } from './intermittent';
import { defaultIntervalPolicy, intervalNumbers } from './interval-policy';
import { defaultResistancePolicy, resistanceNumbers } from './resistance-policy';
import { defaultSessionShape, sessionShapeNumbers } from './session-shape';

describe('the policies of training', () => {
  it.each<[string, PolicyNumbers, Readonly<Record<string, number>>]>([
    ['intervals', intervalNumbers, defaultIntervalPolicy],
    ['intermittent', intermittentNumbers, defaultIntermittentPolicy],
    ['resistance', resistanceNumbers, defaultResistancePolicy],
    ['session', sessionShapeNumbers, defaultSessionShape],
  ])('%s: defaults lie within their bounds, each with a source', (_subject, numbers, values) => {
    expect(policyFaults(numbers, values)).toEqual([]);
    for (const { source, label, lowest, highest } of Object.values(numbers)) {
      expect([source, label]).not.toContain('');
      expect(lowest).toBeLessThan(highest);
    }
  });
});
