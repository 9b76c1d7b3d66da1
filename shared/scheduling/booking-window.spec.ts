import { describe, expect, it } from 'vitest';
import {
  DEFAULT_BOOKING_WINDOW as window,
  isLateCancellation,
  isUndoable,
  takesBookings,
  takesCancellation,
} from './booking-window';
import { occurrenceOn } from './class-dates';

const zone = 'America/New_York';
const held = occurrenceOn('2026-11-02', { localStart: '09:00', durationMinutes: 60 }, zone);
const before = (date: Date, ms: number) => new Date(date.getTime() - ms);

describe('takesBookings', () => {
  it('closes to patients at the start and to staff at the end', () => {
    expect(takesBookings(held, 'patient', before(held.startsAt, 1), zone, window)).toBe(true);
    expect(takesBookings(held, 'patient', held.startsAt, zone, window)).toBe(false);
    expect(takesBookings(held, 'staff', held.startsAt, zone, window)).toBe(true);
    expect(takesBookings(held, 'staff', held.endsAt, zone, window)).toBe(false);
  });

  it('opens to patients so many local days ahead, at the site’s midnight', () => {
    const opens = new Date('2026-08-02T04:00:00Z'); // midnight in New York, 92 days before
    expect(takesBookings(held, 'patient', opens, zone, window)).toBe(true);
    expect(takesBookings(held, 'patient', before(opens, 1), zone, window)).toBe(false);
    expect(takesBookings(held, 'staff', before(opens, 1), zone, window)).toBe(true);
  });
});

describe('cancelling', () => {
  it('is open to a patient until the start', () => {
    expect(takesCancellation(held, 'patient', before(held.startsAt, 1))).toBe(true);
    expect(takesCancellation(held, 'patient', held.startsAt)).toBe(false);
    expect(takesCancellation(held, 'staff', held.endsAt)).toBe(true);
  });

  it('is late inside 24 hours that pass, also over the day that has 25', () => {
    const limit = before(held.startsAt, 24 * 3_600_000);
    expect(limit.toISOString()).toBe('2026-11-01T14:00:00.000Z'); // 09:00 of the day before, by the wall
    expect(isLateCancellation(held, limit, window)).toBe(false);
    expect(isLateCancellation(held, new Date(limit.getTime() + 1000), window)).toBe(true);
  });
});

describe('taking a mark back', () => {
  it('is possible until the class’s day ends at the site', () => {
    expect(isUndoable('2026-11-02', new Date('2026-11-03T04:59:59Z'), zone)).toBe(true);
    expect(isUndoable('2026-11-02', new Date('2026-11-03T05:00:00Z'), zone)).toBe(false);
  });
});
