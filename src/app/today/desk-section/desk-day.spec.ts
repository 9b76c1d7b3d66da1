import type { DeskArrival, DeskClass, DeskSite } from '@shared/contracts/desk-contract';
import { classesToShow, dueAt, figuresOf, isAtHand, missingAt } from './desk-day';

const at = '2026-12-01T15:00:00Z';
const someone = (status: DeskArrival['status'], due: DeskArrival['due'] = null): DeskArrival => ({
  appointmentId: status,
  patientId: status,
  displayName: status,
  recordNumber: 'HL-1',
  phone: null,
  status,
  version: 1,
  due,
});
const classAt = (startsAt: string, given: Partial<DeskClass> = {}): DeskClass => ({
  id: startsAt,
  name: 'Class',
  startsAt,
  endsAt: new Date(Date.parse(startsAt) + 3_600_000).toISOString(),
  capacity: 4,
  booked: given.arrivals?.length ?? 0,
  status: 'scheduled',
  arrivals: [],
  ...given,
});
const owed = { chargeId: 'c', amountMinor: 1800, currency: 'USD' };
const site: DeskSite = {
  id: 's',
  name: 'Quay',
  timeZone: 'UTC',
  localDate: '2026-12-01',
  freed: [],
  classes: [
    classAt('2026-12-01T13:00:00Z'),
    classAt(at, { arrivals: [someone('booked'), someone('arrived'), someone('noshow')] }),
    classAt('2026-12-01T17:00:00Z', { arrivals: [someone('booked', owed), someone('fulfilled')] }),
    classAt('2026-12-01T18:00:00Z'),
    classAt('2026-12-01T19:00:00Z', { status: 'closed', capacity: 9 }),
  ],
};

describe('the desk’s day', () => {
  it('counts who is expected and here, free places of classes to come, and what is due', () => {
    expect(figuresOf(site, at)).toEqual({ expected: 5, here: 2, free: 2 + 4, due: 1 });
  });

  it('misses who has a place in a class that has begun and has not come', () => {
    expect(missingAt(site, at).map(({ date, arrival }) => [date.id, arrival.status])).toEqual([
      [at, 'booked'],
    ]);
    const later = '2026-12-01T20:00:00Z';
    expect(missingAt(site, later).map(({ date }) => date.id)).toContain(at);
    expect(dueAt(site).map(({ arrival }) => arrival.due)).toEqual([owed]);
  });

  it('has at hand what is on or begins within the hour', () => {
    const atHand = site.classes.filter((date) => isAtHand(date, at)).map(({ id }) => id);
    expect(atHand).toEqual([at]);
    expect(isAtHand(classAt('2026-12-01T16:00:00Z'), at)).toBe(true);
    expect(isAtHand(classAt('2026-12-01T14:00:00Z'), at)).toBe(false);
  });

  it('leaves out empty classes that are over or closed', () => {
    expect(classesToShow(site, at).map(({ id }) => id.slice(11, 13))).toEqual(['15', '17', '18']);
  });
});
