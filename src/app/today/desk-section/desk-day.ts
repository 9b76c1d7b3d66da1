import type { DeskArrival, DeskClass, DeskSite } from '@shared/contracts/desk-contract';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';

/** Someone of today's classes with the class. */
export interface Expected {
  readonly arrival: DeskArrival;
  readonly date: DeskClass;
}

export interface DeskFigures {
  /** Everybody who has a place in a class of today. */
  readonly expected: number;
  readonly here: number;
  /** Free places in classes that have not begun. */
  readonly free: number;
  readonly due: number;
}

const came: readonly AppointmentStatus[] = ['arrived', 'checked-in', 'fulfilled'];

export const isHere = ({ status }: Pick<DeskArrival, 'status'>): boolean => came.includes(status);

/** Whether the class has begun by an instant. */
export const hasBegun = ({ startsAt }: Pick<DeskClass, 'startsAt'>, at: string): boolean =>
  Date.parse(startsAt) <= Date.parse(at);

/** Classes that someone looks at in the morning: with people in them, or with places to give still. */
export const classesToShow = ({ classes }: DeskSite, at: string): DeskClass[] =>
  classes.filter(
    (date) => date.arrivals.length > 0 || (date.status === 'scheduled' && !hasBegun(date, at)),
  );

export const freePlaces = ({ status, capacity, booked }: DeskClass): number =>
  status === 'scheduled' ? Math.max(0, capacity - booked) : 0;

const expectedAt = ({ classes }: DeskSite): Expected[] =>
  classes.flatMap((date) => date.arrivals.map((arrival) => ({ arrival, date })));

const isOver = ({ endsAt }: DeskClass, at: string): boolean => Date.parse(endsAt) <= Date.parse(at);

/** Whether a class is on, or begins within the hour. */
export const isAtHand = (date: DeskClass, at: string): boolean =>
  !isOver(date, at) && Date.parse(date.startsAt) <= Date.parse(at) + 3_600_000;

/** Who has a place in a class that has begun and has not come; after the class too, until someone says what became of it. */
export const missingAt = (site: DeskSite, at: string): Expected[] =>
  expectedAt(site).filter(({ arrival, date }) => arrival.status === 'booked' && hasBegun(date, at));

export const dueAt = (site: DeskSite): Expected[] =>
  expectedAt(site).filter(({ arrival }) => arrival.due !== null);

export function figuresOf(site: DeskSite, at: string): DeskFigures {
  const expected = expectedAt(site);
  return {
    expected: expected.length,
    here: expected.filter(({ arrival }) => isHere(arrival)).length,
    free: site.classes
      .filter((date) => !hasBegun(date, at))
      .reduce((sum, date) => sum + freePlaces(date), 0),
    due: dueAt(site).length,
  };
}
