import { isWithin, quantity } from './quantity';
import type { Quantity } from './quantity';

/** Mechanical power on an ergometer, watts. */
export type Watts = Quantity<'W'>;

export const watts = quantity<Watts>('power (W)');

/** Whether a value can be set on an ergometer: 0–1000 W. */
export const isWatts = (value: unknown): value is Watts => isWithin(value, 0, 1000);

export const formatWatts = (power: Watts): string => `${Number(power)} W`;
