import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { ageOn } from './age';

describe('age', () => {
  it.each([
    ['1962-05-14', '2026-05-13', 63],
    ['1962-05-14', '2026-05-14', 64],
    ['2000-02-29', '2001-02-27', 0],
    ['2000-02-29', '2001-02-28', 1],
    ['2000-02-29', '2004-02-28', 3],
    ['2000-02-29', '2004-02-29', 4],
    ['1900-02-28', '2000-02-28', 100],
  ])('born on %s, on %s: %i', (birthDate, localDate, age) => {
    expect(ageOn(birthDate, localDate)).toBe(age);
  });

  it('is what Luxon’s calendar says, on any two dates', () => {
    const date = fc
      .integer({ min: 0, max: 60_000 })
      .map((days) => DateTime.fromISO('1900-01-01', { zone: 'utc' }).plus({ days }));
    fc.assert(
      fc.property(date, date, (one, other) => {
        const [born, on] = one <= other ? [one, other] : [other, one];
        const years = Math.floor(on.diff(born, 'years').years);
        expect(ageOn(born.toISODate() ?? '', on.toISODate() ?? '')).toBe(years);
      }),
      { numRuns: 500 },
    );
  });
});
