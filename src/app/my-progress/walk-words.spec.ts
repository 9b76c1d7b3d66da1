import { walkWords } from './walk-words';

const walk = (performedOn: string, distanceMeters: number) => ({ performedOn, distanceMeters });
const first = walk('2026-10-02', 310);

describe('the walk in words', () => {
  it('tells one walk alone', () => {
    expect(walkWords({ first, latest: first })).toEqual([
      'On Oct 2, 2026 you walked 1,017 feet (310 m).',
    ]);
  });

  it.each([
    [372.5, 'That is 205 feet farther.'],
    [310, 'That is just as far.'],
    [
      300,
      'That is 33 feet less. Walks differ from day to day. Ask your team what it means for you.',
    ],
  ])('sets %d m beside the first', (distance, words) => {
    expect(walkWords({ first, latest: walk('2026-11-28', distance) })[2]).toBe(words);
  });
});
