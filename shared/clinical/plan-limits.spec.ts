import { describe, expect, it } from 'vitest';
import {
  answerTo,
  prescriptionRequest,
  withoutTest,
  type Change,
} from '../../test/builders/prescription-request';
import { physicianCausesOf } from './plan-limits';
import { defaultPolicy } from './prescribing';

const causesOf = (changes: Change[], signer = { first: false, student: false }) =>
  physicianCausesOf(
    { inputs: prescriptionRequest(...changes), result: answerTo(changes), ...signer },
    defaultPolicy,
  );

describe('who signs besides staff', () => {
  it('is nobody inside the limits of the plan', () => {
    expect(causesOf([])).toEqual([]);
    expect(causesOf([(it) => (it.risk = 'low')])).toEqual([]);
    expect(causesOf([withoutTest])).toEqual([]);
    expect(causesOf([(it) => (it.choice.method = 'percent-of-peak')])).toEqual([]);
  });

  it.each<[string, Change[]]>([
    ['risk', [(it) => (it.risk = 'high')]],
    ['risk', [(it) => (it.risk = 'unknown')]],
    ['stop-caution', [(it) => (it.devices.icd.status = 'unknown')]],
    ['stop-caution', [(it) => (it.conditions.outflowObstruction = true)]],
    ['estimated-maximum', [withoutTest, (it) => (it.choice.maximum = 'brawner')]],
    ['above-policy', [(it) => (it.intensity = { lower: 0.4, upper: 0.81 })]],
    [
      'above-policy',
      [
        (it) => (it.choice.method = 'percent-of-peak'),
        (it) => (it.percentOfPeak = { lower: 0.7, upper: 0.85 }),
      ],
    ],
  ])('is a physician for %s', (cause, changes) => {
    expect(causesOf(changes)).toEqual([cause]);
  });

  it('is a physician for a first range and for what a student signs, each told', () => {
    const causes = causesOf([(it) => (it.risk = 'high')], { first: true, student: true });
    expect(causes).toEqual(['first-range', 'student', 'risk']);
  });
});
