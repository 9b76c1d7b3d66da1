import { isWithin, quantity } from './quantity';
import type { Quantity } from './quantity';

/** Time from beat to beat, or of a device's cycle, milliseconds. */
export type Milliseconds = Quantity<'ms'>;

/** A timed performance, seconds. */
export type Seconds = Quantity<'s'>;

/** Duration of exercise in decimal minutes: 13 min 15 s is 13.25. */
export type Minutes = Quantity<'min'>;

export const milliseconds = quantity<Milliseconds>('time (ms)');
export const seconds = quantity<Seconds>('time (s)');
export const minutes = quantity<Minutes>('time (min)');

/** Whether a value can be a device's cycle length: 200–3000 ms, which is 20–300 bpm. */
export const isMilliseconds = (value: unknown): value is Milliseconds => isWithin(value, 200, 3000);

export const minutesOf = (time: Seconds): Minutes => minutes(time / 60);

/** Whole minutes and seconds, as a clock shows them: 13.25 is `13:15`. */
export function formatMinutes(time: Minutes): string {
  const whole = Math.round(time * 60);
  return `${Math.floor(whole / 60)}:${String(whole % 60).padStart(2, '0')}`;
}
