import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addDays, daysBetween, isTimeZone, toInstant, toWallTime, weekdayOf } from './wall-time';

const zones = [
  'America/New_York',
  'America/Chicago',
  'America/Denver',
  'America/Phoenix',
  'America/Los_Angeles',
  'America/Anchorage',
  'Pacific/Honolulu',
  'America/Puerto_Rico',
  'Europe/Dublin',
  'Australia/Lord_Howe',
  'Asia/Kathmandu',
  'Africa/Casablanca',
];

describe('toInstant', () => {
  // Dates of change from the IANA time zone database: northamerica, europe, australasia.
  it.each([
    ['2026-03-08', '02:30', 'America/New_York', '2026-03-08T07:30:00.000Z', 'gap: 03:30 EDT'],
    ['2026-03-08', '03:00', 'America/New_York', '2026-03-08T07:00:00.000Z', 'after the gap'],
    [
      '2026-11-01',
      '01:30',
      'America/New_York',
      '2026-11-01T05:30:00.000Z',
      'twice: the first, EDT',
    ],
    ['2026-11-01', '02:00', 'America/New_York', '2026-11-01T07:00:00.000Z', 'once again'],
    ['2026-03-29', '01:30', 'Europe/Dublin', '2026-03-29T01:30:00.000Z', 'gap: 02:30 IST'],
    ['2026-10-25', '01:30', 'Europe/Dublin', '2026-10-25T00:30:00.000Z', 'twice: the first, IST'],
    [
      '2026-10-04',
      '02:15',
      'Australia/Lord_Howe',
      '2026-10-03T15:45:00.000Z',
      'half-hour gap: 02:45',
    ],
    [
      '2026-04-05',
      '01:45',
      'Australia/Lord_Howe',
      '2026-04-04T14:45:00.000Z',
      'half an hour twice',
    ],
    ['2026-12-01', '09:00', 'America/Denver', '2026-12-01T16:00:00.000Z', 'ordinary'],
    ['2024-02-29', '00:00', 'Asia/Kathmandu', '2024-02-28T18:15:00.000Z', 'leap day'],
  ])('%s %s %s is %s (%s)', (localDate, localTime, zone, instant) => {
    expect(toInstant({ localDate, localTime }, zone).toISOString()).toBe(instant);
  });

  it.each([
    ['2026-02-30', '09:00', 'UTC'],
    ['2026-02-03', '24:30', 'UTC'],
    ['2026-02-03', '09:00', 'Sea/Nowhere'],
  ])('refuses %s %s %s', (localDate, localTime, zone) => {
    expect(() => toInstant({ localDate, localTime }, zone)).toThrow(RangeError);
  });
});

const wallTimes = fc.record({
  zone: fc.constantFrom(...zones),
  day: fc.integer({ min: 0, max: 6 * 365 }),
  minute: fc.integer({ min: 0, max: 1439 }),
});

function wallTime({ day, minute }: { day: number; minute: number }) {
  const [hours, minutes] = [Math.floor(minute / 60), minute % 60].map((part) =>
    String(part).padStart(2, '0'),
  );
  return { localDate: addDays('2025-01-01', day), localTime: `${hours}:${minutes}` };
}

describe('round trip', () => {
  it('gives the same wall time back outside gaps, and one later by the gap inside', () => {
    fc.assert(
      fc.property(wallTimes, ({ zone, ...at }) => {
        const asked = wallTime(at);
        const shown = toWallTime(toInstant(asked, zone), zone);
        const moved =
          Date.parse(`${shown.localDate}T${shown.localTime}Z`) -
          Date.parse(`${asked.localDate}T${asked.localTime}Z`);
        expect([0, 30, 60]).toContain(moved / 60_000);
        if (moved > 0) {
          // In a gap no instant shows the time that was asked for.
          for (let minutes = -180; minutes <= 180; minutes += 15) {
            const near = new Date(toInstant(asked, zone).getTime() + minutes * 60_000);
            expect(toWallTime(near, zone)).not.toEqual(asked);
          }
        }
      }),
      { numRuns: 5_000 },
    );
  });

  it('takes the first of two instants that show the same time', () => {
    fc.assert(
      fc.property(wallTimes, ({ zone, ...at }) => {
        const asked = wallTime(at);
        const instant = toInstant(asked, zone);
        for (const minutes of [30, 60]) {
          const earlier = new Date(instant.getTime() - minutes * 60_000);
          expect(toWallTime(earlier, zone)).not.toEqual(asked);
        }
      }),
      { numRuns: 5_000 },
    );
  });

  it('never runs backward on one day but where the clocks do', () => {
    fc.assert(
      fc.property(wallTimes, fc.integer({ min: 1, max: 1440 }), ({ zone, ...at }, later) => {
        const start = wallTime(at);
        const end = wallTime({
          day: at.day + Math.floor((at.minute + later) / 1440),
          minute: (at.minute + later) % 1440,
        });
        const elapsed =
          (toInstant(end, zone).getTime() - toInstant(start, zone).getTime()) / 60_000;
        // A gap moves the earlier time forward and not the later: two times of the same hour may swap, never by more than the gap.
        expect(elapsed).toBeGreaterThanOrEqual(later - 60);
        expect(elapsed).toBeLessThanOrEqual(later + 60);
      }),
      { numRuns: 5_000 },
    );
  });
});

describe('calendar dates', () => {
  it('knows the ISO weekday', () => {
    expect(weekdayOf('2026-12-01')).toBe(2);
    expect(weekdayOf('2026-12-06')).toBe(7);
  });

  it('counts days across leap days and the turn of the year', () => {
    expect(daysBetween('2024-02-28', '2024-03-01')).toBe(2);
    expect(daysBetween('2027-01-01', '2026-12-31')).toBe(-1);
    expect(addDays('2026-12-31', 1)).toBe('2027-01-01');
  });

  it('knows zones by their names', () => {
    expect(isTimeZone('America/Denver')).toBe(true);
    expect(isTimeZone('Sea/Nowhere')).toBe(false);
  });
});
