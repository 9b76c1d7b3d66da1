import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import { cancellationWords, cancelledWords, costWords } from './charge-words';

const charge = { amountMinor: 1800, currency: 'USD', paid: false };
const session = (given: Partial<AppointmentItem> = {}): AppointmentItem => ({
  id: '019ae2f0-7e55-7000-8000-000000000001',
  classDateId: '019ae2f0-7e55-7000-8000-000000000002',
  patientId: '019ae2f0-7e55-7000-8000-000000000003',
  status: 'booked',
  startsAt: '2026-12-05T17:00:00Z',
  endsAt: '2026-12-05T18:00:00Z',
  version: 1,
  className: 'Strength and walking',
  kind: 'exercise',
  localDate: '2026-12-05',
  monitored: true,
  price: null,
  charge,
  cancelledReason: null,
  site: {
    id: '019ae2f0-7e55-7000-8000-000000000004',
    name: 'Quayside',
    timeZone: 'America/New_York',
    phone: '555-0100',
  },
  ...given,
});
const paid = { ...charge, paid: true };
const last = new Date('2026-12-04T17:00:00Z');

describe('what a session costs', () => {
  it('is said with the last moment to cancel for free, on the clock of the site', () => {
    expect(costWords(session(), last)).toBe(
      'You pay $18.00. You can cancel for free until Friday, December 4, 12:00 PM.',
    );
    expect(costWords(session({ charge: paid }), last)).toMatch(/^You paid \$18.00. You can cancel/);
  });

  it('is said to be due all the same a moment later', () => {
    expect(costWords(session(), new Date(last.getTime() + 1))).toBe(
      'You pay $18.00. It is too late to cancel for free.',
    );
  });

  it('is not spoken of where nothing is paid', () => {
    expect(costWords(session({ charge: null }), last)).toBeNull();
  });
});

it.each([
  [null, false, 'Cancelling costs you nothing.'],
  [charge, false, 'Cancelling is free: you will not pay the $18.00.'],
  [paid, false, 'Cancelling is free: you get your $18.00 back.'],
  [
    null,
    true,
    'The class starts in less than 24 hours. That is late to cancel, but it costs you nothing.',
  ],
  [
    charge,
    true,
    'The class starts in less than 24 hours. If you cancel now, you still pay $18.00.',
  ],
  [
    paid,
    true,
    'The class starts in less than 24 hours. If you cancel now, you do not get your $18.00 back.',
  ],
] as const)('with %o owed, late %s, cancelling asks: %s', (owed, late, words) => {
  expect(cancellationWords(session({ charge: owed }), late)).toBe(words);
});

it.each([
  [null, false, 'Cancelled: Saturday, December 5.'],
  [charge, true, 'Cancelled: Saturday, December 5. You still pay $18.00.'],
  [paid, false, 'Cancelled: Saturday, December 5. Your $18.00 is on its way back.'],
  [paid, true, 'Cancelled: Saturday, December 5.'],
] as const)('with %o owed, late %s, it then says: %s', (owed, late, words) => {
  expect(cancelledWords(session({ charge: owed }), late)).toBe(words);
});
