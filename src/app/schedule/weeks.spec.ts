import type { ClassDate } from '@shared/contracts/schedule-contract';
import { nextWithRoom } from './class-panel/next-with-room';
import { classState, hasRoom, monitorsInWords, placesInWords } from './class-words';
import { byDay, mondayOf, startTimes } from './weeks';

function classDate(
  localDate: string,
  localStart: string,
  given: Partial<ClassDate> = {},
): ClassDate {
  return {
    id: `${localDate} ${localStart}`,
    siteId: 'site',
    name: 'Morning class',
    kind: 'exercise',
    startsAt: `${localDate}T${localStart}:00Z`,
    endsAt: `${localDate}T${localStart}:59Z`,
    localDate,
    localStart,
    capacity: 12,
    booked: 7,
    monitoredCapacity: 6,
    monitoredBooked: 5,
    status: 'scheduled',
    price: null,
    ...given,
  };
}

describe('weeks', () => {
  it('begin on Monday, also over the turn of the year', () => {
    expect(mondayOf('2026-12-06')).toBe('2026-11-30');
    expect(mondayOf('2026-12-07')).toBe('2026-12-07');
    expect(mondayOf('2027-01-01')).toBe('2026-12-28');
  });

  it('have seven days, those without classes too', () => {
    const days = byDay('2026-12-07', [classDate('2026-12-09', '09:00')]);
    expect(days.map(({ dates }) => dates.length)).toEqual([0, 0, 1, 0, 0, 0, 0]);
  });

  it('know at which hours there is room on chosen days', () => {
    const dates = [
      classDate('2026-12-07', '09:00'),
      classDate('2026-12-09', '09:00', { booked: 12 }),
      classDate('2026-12-09', '07:00'),
      classDate('2026-12-09', '13:00', { kind: 'education' }),
      classDate('2026-12-08', '09:00'),
    ];
    expect(startTimes(dates, [1, 3], hasRoom)).toEqual([
      { localStart: '07:00', free: 1, dates: 1 },
      { localStart: '09:00', free: 1, dates: 2 },
    ]);
  });
});

describe('words of a class', () => {
  const date = classDate('2026-12-07', '09:00');

  it('tell places and monitors', () => {
    expect(placesInWords(date)).toBe('7 of 12 places taken');
    expect(monitorsInWords(date)).toBe('5 of 6 monitors taken');
    expect(monitorsInWords({ ...date, monitoredCapacity: 0 })).toBe('Not monitored');
    expect(monitorsInWords({ ...date, monitoredCapacity: 0, kind: 'education' })).toBeNull();
  });

  it('tell what stands out', () => {
    expect(classState(date)).toBeNull();
    expect(classState({ ...date, booked: 12 })?.words).toBe('Full');
    expect(classState({ ...date, monitoredBooked: 6 })?.words).toBe('No monitor free');
    expect(classState({ ...date, monitoredCapacity: 0, monitoredBooked: 0 })).toBeNull();
    expect(classState({ ...date, status: 'closed' })?.words).toBe('Closed');
  });

  it('find the next class with a place and a monitor', () => {
    const others = [
      classDate('2026-12-08', '14:00'),
      classDate('2026-12-08', '09:00', { monitoredBooked: 6 }),
      classDate('2026-12-07', '10:00', { kind: 'education' }),
      classDate('2026-12-07', '11:00', { booked: 12 }),
      classDate('2026-12-06', '09:00'),
    ];
    expect(nextWithRoom(date, others)?.id).toBe('2026-12-08 14:00');
  });
});
