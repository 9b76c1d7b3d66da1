/** A half-open span of time: it holds its start, not its end, so that 9:00–10:00 and 10:00–11:00 do not overlap. */
export interface Interval {
  readonly startsAt: Date;
  readonly endsAt: Date;
}

/** Whether two half-open intervals share an instant. */
export function overlaps(a: Interval, b: Interval): boolean {
  return a.startsAt < b.endsAt && b.startsAt < a.endsAt;
}

/** Whether an instant lies in a half-open interval. */
export function holds(interval: Interval, instant: Date): boolean {
  return interval.startsAt <= instant && instant < interval.endsAt;
}

/** The first of `others` that shares an instant with `interval`, in the order given. */
export function firstOverlap<T extends Interval>(
  interval: Interval,
  others: readonly T[],
): T | undefined {
  return others.find((other) => overlaps(interval, other));
}
