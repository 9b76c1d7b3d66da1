import { describe, expect, it } from 'vitest';
import { occurrenceOn, occurrences } from './class-dates';
import { overlaps } from './intervals';
import { addDays } from './wall-time';

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
const years = [2025, 2026, 2027, 2028, 2029, 2030];
/** Series of 36 at three a week last twelve weeks: these two cross every change of a year's clocks in the zones above. */
const starts = ['02-01', '09-01'];

/** The wall clock by the runtime's own Intl, beside the arithmetic under test. */
function wallClock(zone: string) {
  const format = new Intl.DateTimeFormat('en-CA', {
    timeZone: zone,
    dateStyle: 'short',
    timeStyle: 'short',
    hourCycle: 'h23',
  });
  return (instant: Date) => format.format(instant);
}

describe.each(zones)('series of 36 in %s', (zone) => {
  it.each(years.flatMap((year) => starts.map((start) => `${year}-${start}`)))(
    'from %s keeps 10:00 on the wall on every Monday, Wednesday and Friday',
    (startsOn) => {
      const template = {
        recurrence: 'FREQ=WEEKLY;BYDAY=MO,WE,FR;COUNT=36',
        startsOn,
        endsOn: null,
        localStart: '10:00:00',
        durationMinutes: 60,
      };
      const series = occurrences(template, { from: startsOn, to: addDays(startsOn, 120) }, zone);
      const shown = series.map(({ startsAt }) => wallClock(zone)(startsAt));
      expect(shown).toEqual(series.map(({ localDate }) => `${localDate}, 10:00`));
      expect(new Set(shown).size).toBe(36);
      expect(series.every(({ startsAt, endsAt }) => +endsAt - +startsAt === 3_600_000)).toBe(true);
    },
  );
});

describe('a class at the hour when the clocks change', () => {
  const night = { localStart: '01:30', durationMinutes: 60 };

  it('lasts sixty minutes that pass, in spring', () => {
    const held = occurrenceOn('2026-03-08', night, 'America/New_York');
    expect(held.startsAt.toISOString()).toBe('2026-03-08T06:30:00.000Z');
    expect(held.endsAt.toISOString()).toBe('2026-03-08T07:30:00.000Z');
  });

  it('is held once, at the first of the two hours, in autumn; the second hour is another class', () => {
    const held = occurrenceOn('2026-11-01', night, 'America/New_York');
    expect(held.startsAt.toISOString()).toBe('2026-11-01T05:30:00.000Z');
    const next = occurrenceOn('2026-11-01', { ...night, localStart: '02:00' }, 'America/New_York');
    expect(overlaps(held, next)).toBe(false);
  });
});

describe('occurrences', () => {
  const daily = {
    recurrence: 'FREQ=DAILY',
    startsOn: '2026-12-22',
    endsOn: '2026-12-28',
    localStart: '09:00',
    durationMinutes: 60,
  };

  it('leaves closed dates out', () => {
    const held = occurrences(
      daily,
      { from: '2026-12-24', to: '2027-01-10' },
      'America/Denver',
      new Set(['2026-12-25']),
    );
    expect(held.map(({ localDate }) => localDate)).toEqual([
      '2026-12-24',
      '2026-12-26',
      '2026-12-27',
      '2026-12-28',
    ]);
  });
});
