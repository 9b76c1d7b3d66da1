import fc from 'fast-check';
import { DateTime } from 'luxon';
import { describe, expect, it } from 'vitest';
import { reminderDueAt } from './reminder-time';

const due = (startsAt: string, zone: string): string =>
  reminderDueAt(new Date(startsAt), zone).toISOString();

// Instants worked out by hand from the IANA rules of each zone for 2026 and 2027.
describe('when a class is reminded of', () => {
  it.each([
    ['an ordinary day', '2026-12-07T14:00:00Z', 'America/New_York', '2026-12-06T23:00:00.000Z'],
    [
      'the day clocks go forward',
      '2027-03-14T13:00:00Z',
      'America/New_York',
      '2027-03-13T23:00:00.000Z',
    ],
    ['the day after that', '2027-03-15T13:00:00Z', 'America/New_York', '2027-03-14T22:00:00.000Z'],
    [
      'the day clocks go back',
      '2026-11-01T14:00:00Z',
      'America/New_York',
      '2026-10-31T22:00:00.000Z',
    ],
    ['the day after that', '2026-11-02T14:00:00Z', 'America/New_York', '2026-11-01T23:00:00.000Z'],
    [
      'a patient three hours west',
      '2026-12-07T14:00:00Z',
      'America/Los_Angeles',
      '2026-12-07T02:00:00.000Z',
    ],
    [
      'a zone without summer time',
      '2026-07-07T16:00:00Z',
      'America/Phoenix',
      '2026-07-07T01:00:00.000Z',
    ],
    ['a zone of half hours', '2026-12-07T03:30:00Z', 'Asia/Kolkata', '2026-12-06T12:30:00.000Z'],
    [
      'a zone east of the date line',
      '2026-12-06T20:00:00Z',
      'Pacific/Auckland',
      '2026-12-06T05:00:00.000Z',
    ],
    ['the first of a year', '2027-01-01T15:00:00Z', 'America/Chicago', '2027-01-01T00:00:00.000Z'],
    [
      'the first of March in a leap year',
      '2028-03-01T15:00:00Z',
      'America/Chicago',
      '2028-03-01T00:00:00.000Z',
    ],
  ])('%s', (_, startsAt, zone, expected) => {
    expect(due(startsAt, zone)).toBe(expected);
  });

  it('is at 18:00 on the calendar day before, wherever and whenever', () => {
    const zones = [
      'America/New_York',
      'Australia/Lord_Howe',
      'Europe/Dublin',
      'Pacific/Apia',
      'Asia/Tehran',
    ];
    fc.assert(
      fc.property(
        fc.date({ min: new Date('2026-01-01'), max: new Date('2031-01-01'), noInvalidDate: true }),
        fc.constantFrom(...zones),
        (startsAt, zone) => {
          const start = DateTime.fromJSDate(startsAt, { zone });
          const reminded = DateTime.fromJSDate(reminderDueAt(startsAt, zone), { zone });
          expect(reminded.toFormat('HH:mm')).toBe('18:00');
          expect(reminded.toISODate()).toBe(start.minus({ days: 1 }).toISODate());
        },
      ),
    );
  });
});
