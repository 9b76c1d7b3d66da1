import { policyNumber } from './policy-number';

describe('policyNumber', () => {
  it.each([
    [0.4, '', 0.9, '40 %'],
    [0.55, '', 0.9, '55 %'],
    [0.575, '', 0.9, '57.5 %'],
    [2, '', 6, '2'],
    [10, 'bpm', 30, '10 bpm'],
    [0.05, 'm', 0.4, '0.05 m'],
    [88, '%', 94, '88 %'],
  ])('writes %d in "%s" up to %d as %s', (value, unit, highest, words) => {
    expect(policyNumber(value, { unit, highest })).toBe(words);
  });
});
