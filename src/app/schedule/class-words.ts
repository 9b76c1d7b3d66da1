import type { AppointmentStatus, ClassDate } from '@shared/contracts/schedule-contract';
import type { BookingConflict } from '@shared/scheduling/booking-conflict';
import type { Tone } from '../ui/state-chip/state-chip';

type Places = Pick<ClassDate, 'booked' | 'capacity' | 'monitoredBooked' | 'monitoredCapacity'>;

/** `7 of 12 places taken` */
export function placesInWords({ booked, capacity }: Places): string {
  return `${booked} of ${capacity} places taken`;
}

/** `5 of 6 monitors taken`; in a class without monitors that, or null where there is no exercise. */
export function monitorsInWords(date: Places & Pick<ClassDate, 'kind'>): string | null {
  const { monitoredBooked, monitoredCapacity, kind } = date;
  if (monitoredCapacity === 0) return kind === 'exercise' ? 'Not monitored' : null;
  return `${monitoredBooked} of ${monitoredCapacity} monitors taken`;
}

export interface ClassState {
  readonly words: string;
  readonly tone: Tone;
}

/** What stands out about a class date, null when it simply has room. */
export function classState(date: Places & Pick<ClassDate, 'status'>): ClassState | null {
  if (date.status === 'closed') return { words: 'Closed', tone: 'over' };
  if (date.status === 'cancelled') return { words: 'Withdrawn', tone: 'over' };
  if (date.booked >= date.capacity) return { words: 'Full', tone: 'due' };
  const { monitoredBooked, monitoredCapacity } = date;
  if (monitoredCapacity > 0 && monitoredBooked >= monitoredCapacity)
    return { words: 'No monitor free', tone: 'due' };
  return null;
}

/** Whether a class date can take one more patient of some kind. */
export function hasRoom(date: Places & Pick<ClassDate, 'status'>): boolean {
  return date.status === 'scheduled' && date.booked < date.capacity;
}

const statusWords: Record<AppointmentStatus, ClassState> = {
  proposed: { words: 'Proposed', tone: 'plain' },
  pending: { words: 'Pending', tone: 'plain' },
  booked: { words: 'Booked', tone: 'plain' },
  arrived: { words: 'Arrived', tone: 'in' },
  'checked-in': { words: 'Checked in', tone: 'in' },
  fulfilled: { words: 'Done', tone: 'in' },
  cancelled: { words: 'Cancelled', tone: 'plain' },
  noshow: { words: 'No-show', tone: 'due' },
  waitlist: { words: 'Waiting', tone: 'plain' },
  'entered-in-error': { words: 'Entered in error', tone: 'over' },
};

export const statusInWords = (status: AppointmentStatus): ClassState => statusWords[status];

const conflictWords: Record<BookingConflict, string> = {
  'class-closed': 'No class at this hour',
  'no-active-enrollment': 'No active enrollment',
  'course-complete': 'All sessions of the course are booked',
  'daily-limit': 'No more sessions fit on this day',
  'overlapping-appointment': 'Has another class at this time',
  'class-full': 'Class is full',
  'monitors-full': 'All monitors are taken',
};

/** Why a date of a series can't be booked, in a table's few words. */
export const conflictInWords = (conflict: BookingConflict): string => conflictWords[conflict];

export const kindWords: Record<ClassDate['kind'], string> = {
  exercise: 'Exercise',
  orientation: 'Orientation',
  education: 'Education',
};
