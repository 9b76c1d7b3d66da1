import { isWithin, quantity } from './quantity';
import type { Quantity, Range } from './quantity';

/** Heart rate, beats a minute. */
export type Bpm = Quantity<'/min'>;

export const bpm = quantity<Bpm>('heart rate (bpm)');

/** Whether a value can be the heart rate of a living adult: 20–300 bpm. */
export const isBpm = (value: unknown): value is Bpm => isWithin(value, 20, 300);

export const formatBpm = (rate: Bpm): string => `${Number(rate)} bpm`;

export const formatBpmRange = (range: Range<Bpm>): string =>
  `${Number(range.lower)}–${Number(range.upper)} bpm`;
