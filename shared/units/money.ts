/**
 * How many decimals a currency's minor unit has: 2 for USD, 0 for JPY.
 * @param currency ISO 4217 code, either case
 * @throws RangeError when the code is not three letters
 */
export function minorUnitDigits(currency: string): number {
  return (
    new Intl.NumberFormat('en-US', { style: 'currency', currency }).resolvedOptions()
      .maximumFractionDigits ?? 2
  );
}

/**
 * Writes an amount for people, e.g. `$25.00`.
 * The division is for display alone: it is exact to the last printed digit up to 15 digits.
 * @param amountMinor integer minor units (cents for USD), at most 15 digits
 * @param currency ISO 4217 code, either case
 * @throws RangeError when the amount is not such an integer or the code is not three letters
 */
export function formatMoney(amountMinor: number, currency: string): string {
  if (!Number.isInteger(amountMinor) || Math.abs(amountMinor) > 999_999_999_999_999) {
    throw new RangeError(`Money is an integer of minor units of at most 15 digits: ${amountMinor}`);
  }
  return new Intl.NumberFormat('en-US', { style: 'currency', currency }).format(
    amountMinor / 10 ** minorUnitDigits(currency),
  );
}
