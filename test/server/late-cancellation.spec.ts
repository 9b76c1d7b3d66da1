import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Charge } from '@shared/contracts/billing-contract';
import type { AppointmentItem } from '@shared/contracts/schedule-contract';
import {
  COMPLETED,
  openPaymentHouse,
  type Owed,
  type PaymentHouse,
} from '../builders/payment-house';

let house: PaymentHouse;
const start = new Date().toISOString();

beforeAll(async () => {
  house = await openPaymentHouse();
});
afterAll(() => house.close());
// A class in three hours from here, on a later day, starts so many days and three hours on.
beforeEach(() => house.testApp.clock.set(start));

async function appointmentsOf({ payer }: Owed): Promise<AppointmentItem[]> {
  const { body } = await payer.get('/api/appointments?limit=100').expect(200);
  return (body as { items: AppointmentItem[] }).items;
}

async function chargesOf({ payer }: Owed): Promise<Charge[]> {
  return ((await payer.get('/api/charges').expect(200)).body as { items: Charge[] }).items;
}

async function startOf(owed: Owed): Promise<number> {
  const [appointment] = await appointmentsOf(owed);
  return Date.parse(appointment?.startsAt ?? '');
}

/** Moves the clock to so long before the class; a session that stood idle meanwhile is not the matter here. */
async function waitUntil(owed: Owed, milliseconds: number): Promise<void> {
  const classStart = await startOf(owed);
  await house.query(
    'UPDATE sessions SET expire = $1, created_at = $2',
    new Date(classStart),
    new Date(classStart - milliseconds),
  );
  house.testApp.clock.set(new Date(classStart - milliseconds).toISOString());
}

const cancel = ({ appointmentId, payer }: Owed, given: object = {}) =>
  payer
    .patch(`/api/appointments/${appointmentId}`)
    .send({ status: 'cancelled', version: 1, ...given });

const bookAgain = async (owed: Owed): Promise<string> => {
  const [{ classDateId } = { classDateId: '' }] = await appointmentsOf(owed);
  const call = owed.payer.post('/api/appointments').set('Idempotency-Key', randomUUID());
  return ((await call.send({ classDateId }).expect(201)).body as { id: string }).id;
};

async function payFor(owed: Owed): Promise<void> {
  const { url } = (await house.checkout(owed).expect(200)).body as { url: string };
  await house.pay(url);
  for (const webhook of await house.webhooksOf(owed, COMPLETED)) await house.tell(webhook);
}

const DAY = 24 * 3_600_000;
const owing = { amountMinor: 2500, currency: 'USD', paid: false };

describe('at the last moment to cancel for free', () => {
  it('nothing is owed any more', async () => {
    const owed = await house.owe(2);
    expect((await appointmentsOf(owed))[0]?.charge).toEqual(owing);
    await waitUntil(owed, DAY);
    await cancel(owed, { acceptsLate: false }).expect(200);
    expect((await appointmentsOf(owed))[0]).toMatchObject({ status: 'cancelled', charge: null });
  });

  it('what was paid comes back', async () => {
    const owed = await house.owe(2);
    await payFor(owed);
    expect((await appointmentsOf(owed))[0]?.charge).toEqual({ ...owing, paid: true });
    await waitUntil(owed, DAY);
    await cancel(owed, { acceptsLate: false }).expect(200);
    expect((await appointmentsOf(owed))[0]?.charge).toBeNull();
    expect((await chargesOf(owed))[0]).toMatchObject({ refund: 'pending' });
  });
});

describe('a moment later', () => {
  it('who was told that it is free is not charged: nothing is cancelled', async () => {
    const owed = await house.owe(2);
    await waitUntil(owed, DAY - 1);
    const refused = await cancel(owed, { acceptsLate: false }).expect(409);
    expect(refused.body).toMatchObject({ code: 'late-cancellation' });
    expect((await appointmentsOf(owed))[0]).toMatchObject({ status: 'booked', version: 1 });
  });

  it('who takes it still owes it, and sees for what', async () => {
    const owed = await house.owe(2);
    await waitUntil(owed, DAY - 1);
    await cancel(owed, { acceptsLate: true }).expect(200);
    expect((await appointmentsOf(owed))[0]).toMatchObject({ status: 'cancelled', charge: owing });
    expect(await chargesOf(owed)).toMatchObject([
      { status: 'open', appointment: { id: owed.appointmentId, cancelled: true } },
    ]);
  });

  it('who says nothing of it cancels late, as programs of others do', async () => {
    const owed = await house.owe(2);
    await waitUntil(owed, DAY - 1);
    await cancel(owed).expect(200);
    expect(await chargesOf(owed)).toMatchObject([{ status: 'open' }]);
  });
});

describe('a place taken again', () => {
  it.each([false, true])(
    'after a late cancellation is not charged twice (paid: %s)',
    async (paid) => {
      const owed = await house.owe(2);
      if (paid) await payFor(owed);
      await waitUntil(owed, DAY - 1);
      await cancel(owed).expect(200);
      const again = await bookAgain(owed);
      expect(await chargesOf(owed)).toMatchObject([
        {
          id: owed.chargeId,
          status: paid ? 'paid' : 'open',
          appointment: { id: again, cancelled: false },
        },
      ]);
      const balance = await house.query(
        `SELECT sum(debit_minor - credit_minor)::int AS owed FROM ledger_entries l JOIN charges c ON c.id = l.charge_id
        WHERE c.patient_id = $1 AND account = 'income'`,
        owed.patientId,
      );
      expect(balance).toEqual([{ owed: -2500 }]);
    },
  );

  it('after a free cancellation is charged anew', async () => {
    const owed = await house.owe(2);
    await waitUntil(owed, DAY);
    await cancel(owed).expect(200);
    await bookAgain(owed);
    expect((await chargesOf(owed)).map(({ status }) => status).sort()).toEqual(['open', 'void']);
  });

  it('while the payment of the former is on its way back is charged anew', async () => {
    const owed = await house.owe(2);
    await payFor(owed);
    await cancel(owed).expect(200);
    const again = await bookAgain(owed);
    expect(await chargesOf(owed)).toMatchObject([
      { status: 'open', appointment: { id: again } },
      { id: owed.chargeId, refund: 'pending' },
    ]);
  });
});
