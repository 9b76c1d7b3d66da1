import { describe, expect, it } from 'vitest';
import { wilsonInterval } from './wilson-interval';

describe('the Wilson interval', () => {
  it('stays within 0 and 1 and touches them at none and all', () => {
    expect(wilsonInterval(0, 7).lower).toBe(0);
    expect(wilsonInterval(7, 7).upper).toBe(1);
    for (let total = 1; total <= 40; total += 1) {
      for (let successes = 0; successes <= total; successes += 1) {
        const { lower, proportion, upper } = wilsonInterval(successes, total);
        expect(lower >= 0 && lower <= proportion && proportion <= upper && upper <= 1).toBe(true);
      }
    }
  });

  it.each([
    [1, 0],
    [-1, 5],
    [6, 5],
    [NaN, 5],
  ])('refuses %d of %d', (successes, total) => {
    expect(() => wilsonInterval(successes, total)).toThrow(RangeError);
  });
});
