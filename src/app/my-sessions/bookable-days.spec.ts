import type { AppointmentItem, ClassDate } from '@shared/contracts/schedule-contract';
import { dayStates, isBookable, isLate, mayCancel, placesLeft } from './bookable-days';

const zone = 'America/New_York';
const now = new Date('2026-12-01T15:00:00Z');
const id = (number: number) => `019ae2f0-7e55-7000-8000-00000000000${number}`;

const classDate = (given: Partial<ClassDate> = {}): ClassDate => ({
  id: id(1),
  siteId: id(2),
  name: 'Morning class',
  kind: 'exercise',
  startsAt: '2026-12-07T14:00:00Z',
  endsAt: '2026-12-07T15:00:00Z',
  localDate: '2026-12-07',
  localStart: '09:00',
  capacity: 12,
  booked: 3,
  monitoredCapacity: 6,
  monitoredBooked: 3,
  status: 'scheduled',
  price: null,
  ...given,
});

const held = (given: Partial<AppointmentItem> = {}): AppointmentItem => ({
  id: id(3),
  classDateId: id(1),
  patientId: id(4),
  status: 'booked',
  startsAt: '2026-12-07T14:00:00Z',
  endsAt: '2026-12-07T15:00:00Z',
  version: 1,
  className: 'Morning class',
  kind: 'exercise',
  localDate: '2026-12-07',
  monitored: true,
  price: null,
  charge: null,
  cancelledReason: null,
  site: { id: id(2), name: 'Quayside', timeZone: zone, phone: '555-0100' },
  ...given,
});

const nobody = { appointments: [], dailyLimit: 2, monitored: true };

describe('what a patient can book', () => {
  it('counts monitors for who needs one, in exercise alone', () => {
    const full = classDate({ monitoredBooked: 6 });
    expect(placesLeft(full, { monitored: true })).toBe(0);
    expect(placesLeft(full, { monitored: false })).toBe(9);
    expect(placesLeft({ ...full, kind: 'education' }, { monitored: true })).toBe(9);
  });

  it('is nothing more on a day that holds as many as the course allows', () => {
    const morning = { startsAt: '2026-12-07T12:00:00Z', endsAt: '2026-12-07T13:00:00Z' };
    const one = held({ classDateId: id(9), ...morning });
    const another = held({ classDateId: id(8), ...morning, status: 'noshow' });
    const bookable = (appointments: AppointmentItem[], dailyLimit = 2) =>
      isBookable(classDate(), { ...nobody, dailyLimit, appointments }, zone, now);
    expect(bookable([one])).toBe(true);
    expect(bookable([one], 1)).toBe(false);
    expect(bookable([one, another])).toBe(false);
    expect(bookable([one, { ...another, status: 'cancelled' }])).toBe(true);
  });

  it('is what is open, has room and does not overlap', () => {
    const bookable = (date: ClassDate, own = nobody) => isBookable(date, own, zone, now);
    expect(bookable(classDate())).toBe(true);
    expect(bookable(classDate({ booked: 12 }))).toBe(false);
    expect(bookable(classDate({ status: 'closed' }))).toBe(false);
    expect(bookable(classDate({ startsAt: '2026-12-01T14:59:00Z' }))).toBe(false);
    expect(bookable(classDate({ localDate: '2027-03-04' }))).toBe(false);
    const busy = { ...nobody, appointments: [held({ classDateId: id(9) })] };
    expect(isBookable(classDate(), busy, zone, now)).toBe(false);
    const gone = { ...nobody, appointments: [held({ status: 'cancelled' })] };
    expect(isBookable(classDate(), gone, zone, now)).toBe(true);
  });

  it('is told by day, with the patient’s own', () => {
    const dates = [
      classDate(),
      classDate({
        id: id(5),
        localDate: '2026-12-08',
        startsAt: '2026-12-08T14:00:00Z',
        endsAt: '2026-12-08T15:00:00Z',
      }),
      classDate({ id: id(6), localDate: '2026-12-08', booked: 12 }),
    ];
    expect(dayStates(dates, { ...nobody, appointments: [held()] }, zone, now)).toEqual([
      { localDate: '2026-12-07', free: 0, booked: true },
      { localDate: '2026-12-08', free: 1, booked: false },
    ]);
  });
});

describe('cancelling', () => {
  it('is open until the start, and late within a day of it', () => {
    expect(mayCancel(held(), new Date('2026-12-07T13:59:59Z'))).toBe(true);
    expect(mayCancel(held(), new Date('2026-12-07T14:00:00Z'))).toBe(false);
    expect(mayCancel(held({ status: 'arrived' }), now)).toBe(false);
    expect(isLate(held(), new Date('2026-12-06T14:00:00Z'))).toBe(false);
    expect(isLate(held(), new Date('2026-12-06T14:00:01Z'))).toBe(true);
  });
});
