import { matchingZones, timeIn } from './time-zones';

const zones = [
  'America/Chicago',
  'America/New_York',
  'America/North_Dakota/New_Salem',
  'Asia/Tokyo',
];

describe('matchingZones', () => {
  it('finds a city as people write it', () => {
    expect(matchingZones(zones, 'new york')).toEqual(['America/New_York']);
    expect(matchingZones(zones, 'NEW_YORK ')).toEqual(['America/New_York']);
    expect(matchingZones(zones, 'america chicago')).toEqual(['America/Chicago']);
  });

  it('puts first what begins with the words, and gives no more than asked for', () => {
    expect(matchingZones(['Asia/Tokyo', 'Europe/Oslo'], 'o')).toEqual([
      'Europe/Oslo',
      'Asia/Tokyo',
    ]);
    expect(matchingZones(zones, '', 2)).toHaveLength(2);
    expect(matchingZones(zones, 'nowhere')).toEqual([]);
  });
});

describe('timeIn', () => {
  it('is the wall time there', () => {
    const instant = new Date('2026-12-01T14:05:00Z');
    expect(timeIn('America/New_York', instant)).toMatch(/Tuesday.*9:05/);
    expect(timeIn('Nowhere/Else', instant)).toBe('');
  });
});
