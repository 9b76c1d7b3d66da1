import type { Bpm, Milliseconds } from '../units';
import { bpm, milliseconds } from '../units';

const millisecondsPerMinute = 60_000;

/**
 * Rate of a cycle length as device reports print it: 60 000 / ms, so that 400 ms is 150 bpm.
 * @param cycle ms, above 0
 * @returns bpm, not rounded; round down where it becomes a limit
 * @throws RangeError when the cycle is not above 0
 */
export function rateOfCycleLength(cycle: Milliseconds): Bpm {
  if (cycle <= 0) throw new RangeError('cycle length: above 0 ms is expected');
  return bpm(millisecondsPerMinute / cycle);
}

/**
 * Cycle length of a rate: 60 000 / bpm.
 * @param rate bpm, above 0
 * @returns ms, not rounded
 * @throws RangeError when the rate is not above 0
 */
export function cycleLengthOfRate(rate: Bpm): Milliseconds {
  if (rate <= 0) throw new RangeError('cycle length: a rate above 0 bpm is expected');
  return milliseconds(millisecondsPerMinute / rate);
}
