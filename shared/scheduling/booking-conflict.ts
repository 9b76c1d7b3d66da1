/** Why a place can't be booked, in the order in which the first that applies is told. */
export const bookingConflicts = [
  'class-closed',
  'no-active-enrollment',
  'course-complete',
  'daily-limit',
  'overlapping-appointment',
  'class-full',
  'monitors-full',
] as const;

export type BookingConflict = (typeof bookingConflicts)[number];

/** What decides whether one patient may take one place of one class date. */
export interface BookingFacts {
  /** The class date exists, is scheduled, and takes bookings at this hour. */
  readonly classOpen: boolean;
  readonly courseActive: boolean;
  /** Places that the course may still hold. */
  readonly courseLeft: number;
  /** Places that the patient may still hold on that local date. */
  readonly dayLeft: number;
  /** Whether the patient holds a place in another class at that time, or in this one already. */
  readonly overlapping: boolean;
  readonly placesLeft: number;
  /** Whether the patient exercises on a monitored place in such a class. */
  readonly needsMonitor: boolean;
  readonly monitorsLeft: number;
}

const applies: Record<BookingConflict, (facts: BookingFacts) => boolean> = {
  'class-closed': (facts) => !facts.classOpen,
  'no-active-enrollment': (facts) => !facts.courseActive,
  'course-complete': (facts) => facts.courseLeft <= 0,
  'daily-limit': (facts) => facts.dayLeft <= 0,
  'overlapping-appointment': (facts) => facts.overlapping,
  'class-full': (facts) => facts.placesLeft <= 0,
  'monitors-full': (facts) => facts.needsMonitor && facts.monitorsLeft <= 0,
};

/** The first reason against a booking, or null when it may be made. */
export function bookingConflict(facts: BookingFacts): BookingConflict | null {
  return bookingConflicts.find((conflict) => applies[conflict](facts)) ?? null;
}
