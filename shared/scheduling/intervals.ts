/** A half-open span of time: it holds its start, not its end, so that 9:00–10:00 and 10:00–11:00 do not overlap. */
export interface Interval {
  readonly startsAt: Date;
  readonly endsAt: Date;
}

/** Whether two half-open intervals share an instant. */
export function overlaps(a: Interval, b: Interval): boolean {
  return a.startsAt < b.endsAt && b.startsAt < a.endsAt;
}
