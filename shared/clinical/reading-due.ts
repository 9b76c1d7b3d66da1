import type { Placement } from './placement';
import type { VitalPhase } from './vital-sign-bounds';

/**
 * Minutes until the next reading is due. Common practice in supervised classes, from memory: readings before, every five
 * to ten minutes during and after exercise, and a recheck within two minutes of slowing down. Local policy prevails.
 */
export const readingIntervals = {
  afterCheckIn: 10,
  atRest: 10,
  atExercise: 8,
  overCeiling: 2,
} as const;

/** A reading as far as the next one depends on it. */
export interface LastReading {
  readonly phase: VitalPhase;
  readonly measuredAt: Date;
  readonly placement: Placement | null;
}

const minutesLater = (at: Date, minutes: number): Date => new Date(at.getTime() + minutes * 60_000);

/** When the next reading is due; null when none is: after recovery in which the ceiling was not passed. */
export function nextReadingDue(checkedInAt: Date | null, last: LastReading | null): Date | null {
  if (last === null) {
    return checkedInAt && minutesLater(checkedInAt, readingIntervals.afterCheckIn);
  }
  const { phase, measuredAt, placement } = last;
  if (placement === 'over-ceiling') return minutesLater(measuredAt, readingIntervals.overCeiling);
  if (phase === 'recovery') return null;
  return minutesLater(
    measuredAt,
    phase === 'exercise' ? readingIntervals.atExercise : readingIntervals.atRest,
  );
}
