import { ageWords } from './age-words';

describe('the age of an entry', () => {
  it.each<[string, boolean, number | undefined, string]>([
    ['2026-12-01', false, undefined, 'today'],
    ['2026-11-30', false, undefined, '1 day ago'],
    ['2026-10-02', true, undefined, '60 days ago: old, measure or ask again'],
    ['2026-11-18', false, 180, '13 days ago, counts for 180 days by the policy'],
  ])('of %s', (date, isOld, validDays, words) => {
    expect(ageWords(date, '2026-12-01', isOld, validDays)).toBe(words);
  });
});
