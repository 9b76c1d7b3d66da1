import { isWithin, quantity } from './quantity';
import type { Quantity } from './quantity';

/** Distance or a step's height, meters. */
export type Meters = Quantity<'m'>;

/** Speed, meters a minute. */
export type MetersPerMinute = Quantity<'m/min'>;

export const meters = quantity<Meters>('distance (m)');
export const metersPerMinute = quantity<MetersPerMinute>('speed (m/min)');

/** Whether a value can be a distance walked in six minutes: above 0, to 2000 m. */
export const isMeters = (value: unknown): value is Meters => isWithin(value, 0, 2000) && value > 0;

/** Whether a value can be a treadmill's speed: 0–500 m/min. */
export const isMetersPerMinute = (value: unknown): value is MetersPerMinute =>
  isWithin(value, 0, 500);

/** One mile an hour, exact: 1609.344 m in 60 min. */
const metersPerMinutePerMph = 26.8224;

export const speedOfMph = (mph: number): MetersPerMinute =>
  metersPerMinute(mph * metersPerMinutePerMph);
export const mphOf = (speed: MetersPerMinute): number => speed / metersPerMinutePerMph;

/** The international foot, exact: 0.3048 m. */
const metersPerFoot = 0.3048;

export const feetOf = (distance: Meters): number => distance / metersPerFoot;

export const formatMeters = (distance: Meters): string => `${distance.toFixed(0)} m`;

/** Miles an hour with one decimal, as treadmills show it. */
export const formatMph = (speed: MetersPerMinute): string => `${mphOf(speed).toFixed(1)} mph`;
