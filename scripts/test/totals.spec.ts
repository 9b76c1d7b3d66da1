import { describe, expect, it } from 'vitest';
import { addTotals, summary, vitestTotals } from './totals.mjs';

const file = (status: string, tests: number) => ({
  status,
  assertionResults: Array.from({ length: tests }),
});

describe('the totals of a run', () => {
  it('are those of the report', () => {
    const report = {
      numPassedTests: 5,
      numFailedTests: 2,
      testResults: [file('passed', 4), file('failed', 3)],
    };
    expect(vitestTotals(report, 1)).toEqual({ passed: 5, failed: 2 });
  });

  it('count a file that could not be read as one failure', () => {
    const report = {
      numPassedTests: 4,
      numFailedTests: 0,
      testResults: [file('passed', 4), file('failed', 0)],
    };
    expect(vitestTotals(report, 1)).toEqual({ passed: 4, failed: 1 });
  });

  it.each([
    ['that ends badly though its tests passed', 3, 1],
    ['that finds no test', 0, 0],
  ])('count a run %s as a failure', (_case, passed, exitCode) => {
    const report = {
      numPassedTests: passed,
      numFailedTests: 0,
      testResults: [file('passed', passed)],
    };
    expect(vitestTotals(report, exitCode)).toEqual({ passed, failed: 1 });
  });

  it('count a run without a report as a failure', () => {
    expect(vitestTotals(null, 128)).toEqual({ passed: 0, failed: 1 });
  });

  it('add up to the last line', () => {
    const all = [
      { passed: 3, failed: 0 },
      { passed: 4, failed: 1 },
    ];
    expect(summary(addTotals(all))).toBe('7 passed, 1 failed');
  });
});
