import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ChargeHistory } from '@shared/contracts/billing-contract';
import type { Payments, PaymentsFailure, Refund } from '../../server/payments/payments';
import {
  COMPLETED,
  openPaymentHouse,
  standing,
  type Owed,
  type PaymentHouse,
} from '../builders/payment-house';

type RefundAnswer = Refund | PaymentsFailure;

const refund = (status: Refund['status']): Refund => ({
  outcome: 'refund',
  serviceRefundId: '',
  status,
  amountMinor: 2500,
  currency: 'usd',
});
const failure = (outcome: PaymentsFailure['outcome'], code: string | null): PaymentsFailure => ({
  outcome,
  code,
  requestId: null,
  detail: 'told by the spec',
});

/** What the service answers to refunds; everything else is the stand-in's. */
const answers: { create: RefundAnswer; retrieve: RefundAnswer } = {
  create: refund('pending'),
  retrieve: refund('pending'),
};
const asked: string[] = [];

let house: PaymentHouse;

beforeAll(async () => {
  house = await openPaymentHouse((payments): Payments => ({
    ...payments,
    createRefund: ({ refundId }) => {
      asked.push('create');
      return Promise.resolve({ ...answers.create, serviceRefundId: `re_${refundId}` });
    },
    retrieveRefund: (serviceRefundId) => {
      asked.push(`retrieve ${serviceRefundId}`);
      return Promise.resolve({ ...answers.retrieve, serviceRefundId });
    },
  }));
});
afterAll(() => house.close());

beforeEach(() => {
  answers.create = refund('pending');
  answers.retrieve = refund('pending');
});

async function refunding(): Promise<{ owed: Owed; refundId: string }> {
  const owed = await house.owe();
  const { url } = (await house.checkout(owed).expect(200)).body as { url: string };
  await house.pay(url);
  for (const webhook of await house.webhooksOf(owed, COMPLETED)) {
    await house.tell(webhook).expect(200);
  }
  await house.cancel(owed, house.frontDesk).expect(200);
  const [row] = await house.query<{ id: string }>(
    'SELECT r.id FROM refunds r JOIN payments p ON p.id = r.payment_id WHERE p.charge_id = $1',
    owed.chargeId,
  );
  const refundId = row?.id ?? '';
  asked.length = 0;
  await house.run('send-refund', { refundId }).catch(() => undefined);
  return { owed, refundId };
}

async function reconcile(): Promise<void> {
  await house.query(`UPDATE refunds SET created_at = created_at - interval '6 minutes'`);
  await house.run('reconcile-payments');
}

describe('a refund that the service keeps pending', () => {
  it('is asked about by the job until it came through, and counted once', async () => {
    const { owed, refundId } = await refunding();
    await reconcile();
    expect(asked).toEqual(['create', `retrieve re_${refundId}`]);
    expect((await standing(house, owed)).refunds).toEqual(['pending']);
    answers.retrieve = refund('succeeded');
    await Promise.all([reconcile(), reconcile()]);
    const after = await standing(house, owed);
    expect([after.charge, after.refunds]).toEqual(['refunded', ['settled']]);
    expect(after.balances).toEqual({ income: -2500, refunds: 2500 });
    await reconcile();
    expect(await standing(house, owed)).toEqual(after);
  });

  it('is told as failed when it failed in the end', async () => {
    const { owed } = await refunding();
    answers.retrieve = refund('failed');
    await reconcile();
    const after = await standing(house, owed);
    expect([after.charge, after.refunds]).toEqual(['paid', ['failed']]);
  });

  it('is asked for again when the service had not answered', async () => {
    answers.create = failure('unavailable', null);
    const { owed } = await refunding();
    await reconcile();
    expect((await standing(house, owed)).refunds).toEqual(['pending']);
    answers.create = refund('succeeded');
    await reconcile();
    expect((await standing(house, owed)).refunds).toEqual(['settled']);
  });

  it('is settled when the money turns out to be back already', async () => {
    answers.create = failure('refused', 'charge_already_refunded');
    const { owed } = await refunding();
    expect((await standing(house, owed)).refunds).toEqual(['settled']);
  });
});

describe('the page of a charge', () => {
  it('tells who paid, who gave the place back, and when', async () => {
    const { owed } = await refunding();
    const { body } = await house.frontDesk.get(`/api/billing/charges/${owed.chargeId}`).expect(200);
    const { charge, payments } = body as ChargeHistory;
    expect(charge).toMatchObject({
      id: owed.chargeId,
      patientId: owed.patientId,
      refund: 'pending',
    });
    const now = house.testApp.clock.now().toISOString();
    expect(payments).toEqual([
      {
        id: expect.any(String),
        amountMinor: 2500,
        currency: 'USD',
        status: 'settled',
        by: { displayName: expect.any(String), isPatient: true },
        at: now,
        settledAt: now,
        refund: {
          status: 'pending',
          reason: 'cancelled',
          by: { displayName: expect.any(String), isPatient: false },
          at: expect.any(String),
          settledAt: null,
        },
      },
    ]);
  });

  it('finds charges by name or number, and by nothing else', async () => {
    const owed = await house.owe();
    const [who] = await house.query<{ family: string; number: string }>(
      'SELECT family_name AS family, record_number AS number FROM patients WHERE id = $1',
      owed.patientId,
    );
    const found = async (q: string) => {
      const { body } = await house.frontDesk.post('/api/billing/charges').send({ q }).expect(200);
      return (body as { items: { id: string }[] }).items.map(({ id }) => id);
    };
    expect(await found(who?.number ?? '')).toEqual([owed.chargeId]);
    expect(await found(who?.family.toUpperCase() ?? '')).toContain(owed.chargeId);
    expect(await found('nobody-of-this-name')).toEqual([]);
    expect((await found('  ')).length).toBeGreaterThan(1);
  });
});
