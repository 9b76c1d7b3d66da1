import { policyNumber } from './policy-number';

describe('policyNumber', () => {
  it.each([
    [0.4, '', '40 %'],
    [0.55, '', '55 %'],
    [0.575, '', '57.5 %'],
    [10, 'bpm', '10 bpm'],
    [0.05, 'm', '0.05 m'],
    [88, '%', '88 %'],
  ])('writes %d in "%s" as %s', (value, unit, words) => {
    expect(policyNumber(value, unit)).toBe(words);
  });
});
