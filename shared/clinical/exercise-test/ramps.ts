import type { Minutes, Watts } from '../../units';
import { minutes, toMillionths, watts } from '../../units';
import type { TreadmillStage } from './protocols';

/** A minute of a cycle ramp. */
export interface CycleStage {
  readonly label: string;
  readonly startsAt: Minutes;
  readonly minutes: Minutes;
  readonly power: Watts;
}

export interface TreadmillSetting {
  readonly speedMph: number;
  readonly gradePercent: number;
}

/** The length for which a ramp is chosen, min: long enough to warm up, short enough to reach a peak. Common practice. */
export const rampMinutes = { lowest: 8, highest: 12 } as const;

const everyMinute = <T>(count: number, make: (index: number) => T): T[] => {
  if (!Number.isInteger(count) || count < 1 || count > 30) {
    throw new RangeError('ramp: 1 to 30 whole minutes are expected');
  }
  return Array.from({ length: count }, (_, index) => make(index));
};

/**
 * A treadmill ramp as rows of one minute, from the first setting to the last in even steps. A ramp has no printed table: it is
 * made for the patient.
 * @param count whole minutes, 1–30
 * @throws RangeError for another count
 */
export const treadmillRamp = (
  from: TreadmillSetting,
  to: TreadmillSetting,
  count: number,
): TreadmillStage[] =>
  everyMinute(count, (index) => {
    const fraction = count === 1 ? 0 : index / (count - 1);
    return {
      label: String(index + 1),
      startsAt: minutes(index),
      minutes: minutes(1),
      speedMph: toMillionths(from.speedMph + fraction * (to.speedMph - from.speedMph)),
      gradePercent: toMillionths(
        from.gradePercent + fraction * (to.gradePercent - from.gradePercent),
      ),
      printedMets: null,
    };
  });

/**
 * A cycle ramp as rows of one minute; a row holds the power at its beginning.
 * @param perMinute W added each minute; 10–25 are common
 * @param count whole minutes, 1–30
 * @throws RangeError for another count
 */
export const cycleRamp = (start: Watts, perMinute: Watts, count: number): CycleStage[] =>
  everyMinute(count, (index) => ({
    label: String(index + 1),
    startsAt: minutes(index),
    minutes: minutes(1),
    power: watts(start + index * perMinute),
  }));
