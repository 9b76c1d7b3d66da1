/** A share with the interval that holds its true value in 95 of 100 samples. */
export interface ProportionInterval {
  readonly proportion: number;
  readonly lower: number;
  readonly upper: number;
}

/** Two-sided 95 % quantile of the standard normal distribution. */
const normalQuantile95 = 1.959963984540054;

/**
 * Wilson score interval of a proportion; safe at none and at all.
 * @param successes whole, 0 to `total`
 * @param total whole, above 0
 * @param z quantile of the standard normal distribution, above 0; 95 % when left out
 * @throws RangeError outside these bounds
 * @see Wilson. J Am Stat Assoc 1927;22:209–212
 */
export function wilsonInterval(
  successes: number,
  total: number,
  z = normalQuantile95,
): ProportionInterval {
  if (!(total > 0 && successes >= 0 && successes <= total && z > 0)) {
    throw new RangeError('Wilson interval: 0 to total successes of a total above 0');
  }
  const p = successes / total;
  const zz = z * z;
  const center = p + zz / (2 * total);
  const half = z * Math.sqrt((p * (1 - p)) / total + zz / (4 * total * total));
  const scale = 1 + zz / total;
  // Rounding noise must not push an end past the whole.
  const lower = successes === 0 ? 0 : (center - half) / scale;
  const upper = successes === total ? 1 : (center + half) / scale;
  return { proportion: p, lower, upper };
}
