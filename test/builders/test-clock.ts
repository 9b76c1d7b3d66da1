import type { Clock } from '../../server/app-context';

/** A clock that stands still until it is moved. */
export interface TestClock extends Clock {
  readonly set: (instant: string) => void;
  readonly advance: (milliseconds: number) => void;
}

export function testClock(start = '2026-12-01T15:00:00Z'): TestClock {
  let now = new Date(start);
  return {
    now: () => new Date(now),
    set: (instant) => void (now = new Date(instant)),
    advance: (milliseconds) => void (now = new Date(now.getTime() + milliseconds)),
  };
}

export const minutes = (count: number): number => count * 60_000;
export const hours = (count: number): number => minutes(count * 60);
