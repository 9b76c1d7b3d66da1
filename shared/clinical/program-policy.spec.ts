import { describe, expect, it } from 'vitest';
import type { ProgramPolicy } from './program-policy';
import {
  defaultProgramPolicy,
  programFaults,
  programKeys,
  programSubjects,
} from './program-policy';

const changed = <S extends keyof ProgramPolicy>(
  subject: S,
  values: Partial<ProgramPolicy[S]>,
): ProgramPolicy => ({
  ...defaultProgramPolicy,
  [subject]: { ...defaultProgramPolicy[subject], ...values },
});

describe('the numbers of a program', () => {
  it('may be published as they come', () => {
    expect(programFaults(defaultProgramPolicy)).toEqual([]);
  });

  it('each have a key of their own, words and a source', () => {
    expect(new Set(programKeys.map(({ key }) => key)).size).toBe(programKeys.length);
    expect(new Set(programKeys.map(({ key }) => key.split('.')[0]))).toEqual(
      new Set(programSubjects),
    );
    for (const { label, source } of programKeys) expect([label, source]).not.toContain('');
  });

  it.each<[string, ProgramPolicy]>([
    [
      'resistance.mostRepetitions',
      changed('resistance', { leastRepetitions: 12, mostRepetitions: 9 }),
    ],
    ['intervals.highestFraction', changed('intervals', { highestFraction: 0.7 })],
    ['progression.goalMinutes', changed('session', { conditioningMinutes: 45 })],
    ['staffing.patientsEach', changed('staffing', { patientsEach: 3, highRiskEach: 4 })],
    ['intermittent.mostMinutes', changed('intermittent', { totalMinutes: 30, mostMinutes: 20 })],
    [
      'intervals.longestWorkMinutes',
      changed('intervals', { shortBoutMinutes: 4, longestWorkMinutes: 3 }),
    ],
    ['progression.metsStep', changed('progression', { metsStep: 1.5 })],
  ])('are refused at %s', (key, policy) => {
    expect(programFaults(policy).map((fault) => fault.key)).toEqual([key]);
  });
});
