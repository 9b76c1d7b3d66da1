import { describe, expect, it } from 'vitest';
import { policyFaults } from '../policy-numbers';
import {
  changedKeys,
  defaultProgramPolicy,
  isOnStep,
  orderFaults,
  policyOf,
  policyOrders,
  policyStep,
  programPolicyKeys,
  trainingNumbers,
  trainingPolicyOf,
  trainingSubjects,
  valuesOf,
  withValues,
} from './index';

const defaults = valuesOf(defaultProgramPolicy);

describe('the numbers of a program', () => {
  it('have keys of their own', () => {
    const keys = programPolicyKeys.map(({ key }) => key);
    expect(new Set(keys).size).toBe(keys.length);
    expect(Object.keys(defaults).sort()).toEqual([...keys].sort());
  });

  it.each(programPolicyKeys)('$key has a default, and bounds, on its step', (number) => {
    const step = policyStep(number);
    for (const value of [number.default, number.lowest, number.highest]) {
      expect(isOnStep(value, step)).toBe(true);
    }
    expect(number.source).not.toBe('');
    expect(defaults[number.key]).toBe(number.default);
  });

  it('make the policy again that they were read from', () => {
    expect(policyOf(defaults, 1)).toEqual(defaultProgramPolicy);
  });

  it('make none when one is missing', () => {
    const { oxygenFloor: _, ...rest } = defaults;
    expect(() => policyOf(rest, 1)).toThrow(new RangeError('oxygenFloor'));
  });

  it('fit together as they are published', () => {
    expect(orderFaults(defaults)).toEqual([]);
    for (const subject of trainingSubjects) {
      expect(
        policyFaults(trainingNumbers[subject], defaultProgramPolicy.training[subject]),
      ).toEqual([]);
    }
  });
});

it.each([
  [{ 'margin.icd': 20 }, 1],
  [{ reviewDueDays: 31 }, 1],
  [{ 'intensity.wide.lower': 0.41 }, 0.01],
  [{ 'progression.sessionsNeeded': 3 }, 1],
  [{ 'resistance.lightLoad': 3.5 }, 0.1],
  [{ 'equipment.step.by': 0.04 }, 0.01],
])('the step of %o is %d', (values, step) => {
  const number = programPolicyKeys.find(({ key }) => key in values);
  expect(number && policyStep(number)).toBe(step);
});

it('sets a number exactly on its step, whatever the noise', () => {
  const values = withValues(defaults, { 'intensity.narrow.lower': 0.1 + 0.2, unknown: 7 });
  expect(values['intensity.narrow.lower']).toBe(0.3);
  expect(values).not.toHaveProperty('unknown');
  expect(changedKeys(defaults, values).map(({ key }) => key)).toEqual(['intensity.narrow.lower']);
});

it.each(policyOrders)('$lower may not pass $upper', ({ lower, upper, mayBeEqual }) => {
  const at = (least: number, most: number) =>
    orderFaults({ ...defaults, [lower]: least, [upper]: most })
      .filter(({ key }) => key === upper)
      .map(({ message }) => message);
  expect(at(1e9, 1e9 - 1)).toHaveLength(1);
  expect(at(1e-9, 1e9 - 1)).toEqual([]);
  expect(at(5, 5).some((message) => message.includes('must'))).toBe(!mayBeEqual);
});

it('fills what an older version holds no number for with the published default', () => {
  const old = trainingPolicyOf({ intervals: { highestEffort: 16 } });
  expect(old.intervals).toEqual({
    ...defaultProgramPolicy.training.intervals,
    highestEffort: 16,
  });
  expect(old.progression).toEqual(defaultProgramPolicy.training.progression);
});
