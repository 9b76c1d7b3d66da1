import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { formatMoney, minorUnitDigits } from './money';

describe('formatMoney', () => {
  it.each([
    [2500, 'USD', '$25.00'],
    [1999 * 36, 'usd', '$719.64'],
    [0, 'USD', '$0.00'],
    [-1005, 'USD', '-$10.05'],
    [2500, 'JPY', '¥2,500'],
  ])('%i of %s is %s', (amount, currency, text) => {
    expect(formatMoney(amount, currency)).toBe(text);
  });

  it('prints every digit it was given, up to 15', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 999_999_999_999_999 }), (amount) => {
        const digits = formatMoney(amount, 'USD').replace(/\D/g, '');
        return BigInt(digits) === BigInt(amount);
      }),
    );
  });

  it.each([0.5, NaN, Infinity, 1e15])('refuses %s', (amount) => {
    expect(() => formatMoney(amount, 'USD')).toThrow(RangeError);
  });
});

it('knows currencies without a minor unit', () => {
  expect(minorUnitDigits('JPY')).toBe(0);
  expect(minorUnitDigits('USD')).toBe(2);
});
