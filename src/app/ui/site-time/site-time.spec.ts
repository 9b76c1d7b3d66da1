import { clockOf, dateInWords, otherZoneNote, spanOf, timeOf } from './site-time';

describe('site time', () => {
  it('tells an instant by the clock of the site', () => {
    expect(timeOf('2026-12-07T14:00:00Z', 'America/New_York')).toBe('9:00 AM');
    const span = { startsAt: '2026-12-07T19:30:00Z', endsAt: '2026-12-07T20:30:00Z' };
    expect(spanOf(span, 'America/Denver')).toBe('12:30 PM to 1:30 PM');
    expect(clockOf('17:05')).toBe('5:05 PM');
  });

  it('tells a date without a clock', () => {
    expect(dateInWords('2026-12-07', 'long')).toBe('Monday, December 7');
    expect(dateInWords('2026-12-07', 'short')).toBe('Mon, Dec 7');
    expect(dateInWords('2027-01-01', 'full')).toBe('January 1, 2027');
  });

  it('names the zone only where the browser’s clock shows another time', () => {
    const site = { name: 'Quayside', timeZone: 'America/New_York' };
    const now = new Date('2026-12-07T14:00:00Z');
    expect(otherZoneNote(site, now, 'America/Denver')).toBe(
      'Times are Eastern Standard Time, the clock of Quayside.',
    );
    expect(otherZoneNote(site, now, 'America/Detroit')).toBeNull();
  });
});
