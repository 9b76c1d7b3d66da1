import type { ClassDate } from '@shared/contracts/schedule-contract';
import { hasRoom } from '../class-words';

/** The first class of the same kind after this one that has a place, and a monitor where this one has monitors. */
export function nextWithRoom(full: ClassDate, dates: readonly ClassDate[]): ClassDate | undefined {
  return dates
    .filter((date) => date.startsAt > full.startsAt && date.kind === full.kind && hasRoom(date))
    .filter((date) => full.monitoredCapacity === 0 || date.monitoredBooked < date.monitoredCapacity)
    .sort((a, b) => a.startsAt.localeCompare(b.startsAt))[0];
}
