import { describe, expect, it } from 'vitest';
import { mets, minutes } from '../../units';
import {
  defaultIntermittentPolicy,
  firstBouts,
  longerBouts,
  needsIntermittent,
} from './intermittent';

describe('intermittent bouts', () => {
  it.each<[number | null, number | null, boolean | null]>([
    [2.9, null, true],
    [3, null, false],
    [6, 4, true],
    [2.5, 12, false],
    [null, null, null],
  ])('peak %s, longest bout %s: %s', (peak, longest, needed) => {
    const answer = needsIntermittent(
      peak === null ? null : mets(peak),
      longest === null ? null : minutes(longest),
      defaultIntermittentPolicy,
    );
    expect(answer).toBe(needed);
  });

  it('grow longer and fewer until one is left', () => {
    let pattern = firstBouts(null, defaultIntermittentPolicy);
    expect(pattern).toEqual({ bouts: 3, minutesEach: 5, restMinutes: 2, totalMinutes: 15 });
    const seen = [pattern];
    for (let round = 0; round < 20; round += 1) {
      pattern = longerBouts(pattern, defaultIntermittentPolicy);
      seen.push(pattern);
    }
    expect(
      seen.slice(0, 8).map(({ bouts, minutesEach }) => `${bouts} × ${Number(minutesEach)}`),
    ).toEqual(['3 × 5', '3 × 7', '3 × 9', '2 × 11', '2 × 13', '2 × 15', '1 × 17', '1 × 19']);
    expect(pattern).toMatchObject({ bouts: 1, minutesEach: 30, restMinutes: 0 });
    expect(Math.max(...seen.map(({ totalMinutes }) => totalMinutes))).toBeLessThanOrEqual(30);
  });

  it('are no longer than what was managed', () => {
    expect(firstBouts(minutes(3), defaultIntermittentPolicy)).toMatchObject({
      bouts: 5,
      minutesEach: 3,
    });
  });
});
