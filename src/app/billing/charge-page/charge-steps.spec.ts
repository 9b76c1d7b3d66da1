import type { ChargeHistory } from '@shared/contracts/billing-contract';
import { stepsOf } from './charge-steps';

const id = '0193f0aa-0000-7000-8000-000000000001';
const charge: ChargeHistory['charge'] = {
  id,
  patientId: id,
  displayName: 'Ida Marlow',
  recordNumber: 'HL-1001',
  description: 'Strength class',
  amountMinor: 1800,
  currency: 'USD',
  status: 'refunded',
  createdAt: '2026-12-01T15:00:00Z',
  appointment: {
    id,
    startsAt: '2026-12-05T17:00:00Z',
    timeZone: 'America/New_York',
    site: 'Quay',
    cancelled: false,
  },
  paidAt: '2026-12-02T15:04:00Z',
  payment: 'settled',
  refund: 'settled',
};
const desk = { displayName: 'Tobias Lanternier', isPatient: false };
const payment: ChargeHistory['payments'][number] = {
  id,
  amountMinor: 1800,
  currency: 'USD',
  status: 'settled',
  by: { displayName: 'Ida Marlow', isPatient: true },
  at: '2026-12-02T15:00:00Z',
  settledAt: '2026-12-02T15:04:00Z',
  refund: {
    status: 'settled',
    reason: 'cancelled',
    by: desk,
    at: '2026-12-03T14:00:00Z',
    settledAt: '2026-12-03T14:01:00Z',
  },
};
const told = (history: ChargeHistory) =>
  stepsOf(history).map(({ when, what, who }) => [when, what, who]);

describe('stepsOf', () => {
  it('tells who paid and who gave it back, in the order and by the clock of the class', () => {
    expect(told({ charge, payments: [payment] })).toEqual([
      ['Dec 1, 2026, 10:00 AM', 'Charged, as the class was booked', null],
      ['Dec 2, 2026, 10:00 AM', 'Pay page opened', 'Ida Marlow, the patient'],
      ['Dec 2, 2026, 10:04 AM', 'Paid', null],
      [
        'Dec 3, 2026, 9:00 AM',
        'To be paid back, since the place was given back',
        'Tobias Lanternier',
      ],
      ['Dec 3, 2026, 9:01 AM', 'Paid back in full', null],
    ]);
  });

  it('tells attempts that came to nothing, and what Plimsoll gave back by itself', () => {
    const late = {
      ...payment,
      status: 'failed' as const,
      at: '2026-12-02T15:02:00Z',
      refund: {
        status: 'pending' as const,
        reason: 'paid-twice' as const,
        by: null,
        at: '2026-12-02T15:05:00Z',
        settledAt: null,
      },
      settledAt: null,
    };
    const expired = {
      ...late,
      status: 'expired' as const,
      at: '2026-12-01T16:00:00Z',
      refund: null,
    };
    expect(told({ charge, payments: [expired, late] }).slice(1)).toEqual([
      ['Dec 1, 2026, 11:00 AM', 'Pay page opened', 'Ida Marlow, the patient'],
      ['Dec 1, 2026, 11:00 AM', 'The pay page closed unpaid', null],
      ['Dec 2, 2026, 10:02 AM', 'Pay page opened', 'Ida Marlow, the patient'],
      ['Dec 2, 2026, 10:02 AM', 'This attempt did not count', null],
      ['Dec 2, 2026, 10:05 AM', 'To be paid back, since it was paid twice', 'Plimsoll'],
      ['Dec 2, 2026, 10:05 AM', 'Not back yet; asked about every ten minutes', null],
    ]);
  });
});
