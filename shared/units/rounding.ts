/** Takes the noise of binary fractions out before a number is rounded whole: 90.80000000000001 is 90.8. */
export function toMillionths(value: number): number {
  return Math.round(value * 1e6) / 1e6;
}

/** The next whole number at or above; for the lower end of a range, which never widens by rounding. */
export function roundUp(value: number): number {
  return Math.ceil(toMillionths(value));
}

/** The next whole number at or below; for upper ends and ceilings. */
export function roundDown(value: number): number {
  return Math.floor(toMillionths(value));
}

/** The nearest multiple of `step` (above zero) at or below `value`; a multiple missed by noise alone counts. */
export function snapDown(value: number, step: number): number {
  return toMillionths(Math.floor(value / step + 1e-9) * step);
}

/** A number for reading with `digits` decimals, rounded toward the inside of its range; no trailing zeros are cut. */
export function formatInward(value: number, digits: number, end: 'lower' | 'upper'): string {
  const scale = 10 ** digits;
  const whole = end === 'lower' ? roundUp(value * scale) : roundDown(value * scale);
  return (whole / scale).toFixed(digits);
}
