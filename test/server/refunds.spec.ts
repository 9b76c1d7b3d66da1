import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import {
  COMPLETED,
  openPaymentHouse,
  paid,
  standing,
  type Owed,
  type PaymentHouse,
} from '../builders/payment-house';
import { minutes } from '../builders/test-clock';

let house: PaymentHouse;

beforeAll(async () => {
  house = await openPaymentHouse();
});
afterAll(() => house.close());

async function openPage(owed: Owed): Promise<string> {
  return ((await house.checkout(owed).expect(200)).body as { url: string }).url;
}

async function tellAll(owed: Owed): Promise<void> {
  for (const webhook of await house.webhooksOf(owed, COMPLETED))
    await house.tell(webhook).expect(200);
}

async function payFor(owed: Owed): Promise<void> {
  await house.pay(await openPage(owed));
  await tellAll(owed);
}

const waiting = (job: string) =>
  house.query<{ payload: object }>(
    `SELECT j.payload FROM graphile_worker._private_jobs j JOIN graphile_worker._private_tasks t ON t.id = j.task_id
      WHERE t.identifier = $1`,
    job,
  );

/** Runs these jobs, each three times at once as several machines may. */
async function work(job: string): Promise<void> {
  for (const { payload } of await waiting(job)) {
    await Promise.all([1, 2, 3].map(() => house.run(job, payload)));
  }
}

const refundedAtService = async ({ chargeId }: Owed): Promise<number[]> =>
  Object.values((await house.service.state()).refunds)
    .filter(({ metadata }) => metadata?.['charge_id'] === chargeId)
    .map(({ amount }) => amount);

describe('a place given back', () => {
  it('in time and unpaid is not owed any more, and its pay page closes', async () => {
    const owed = await house.owe();
    const url = await openPage(owed);
    await house.cancel(owed).expect(200);
    await work('close-attempt');
    expect(await standing(house, owed)).toEqual({
      charge: 'void',
      payments: ['expired'],
      refunds: [],
      balances: {},
      receipts: 0,
    });
    await house.pay(url);
    expect((await standing(house, owed)).payments).toEqual(['expired']);
    await house.checkout(owed).expect(409);
  });

  it('in time and paid is paid back in full, once', async () => {
    const owed = await house.owe();
    await payFor(owed);
    await house.cancel(owed).expect(200);
    await work('send-refund');
    expect(await refundedAtService(owed)).toEqual([2500]);
    const after = await standing(house, owed);
    expect(after).toEqual({
      ...paid,
      charge: 'refunded',
      refunds: ['settled'],
      balances: { income: -2500, refunds: 2500 },
    });
    for (const webhook of await house.webhooksOf(owed, 'charge.refunded'))
      await house.tell(webhook).expect(200);
    expect(await standing(house, owed)).toEqual(after);
  });

  it('late stays owed, and stays paid', async () => {
    const [unpaid, settled] = [await house.owe(0), await house.owe(0)];
    await payFor(settled);
    await house.cancel(unpaid).expect(200);
    await house.cancel(settled).expect(200);
    expect((await standing(house, unpaid)).charge).toBe('open');
    expect(await standing(house, settled)).toEqual(paid);
    expect(await refundedAtService(settled)).toEqual([]);
  });

  it('while it is being paid is paid back when the payment comes', async () => {
    const owed = await house.owe();
    const url = await openPage(owed);
    await house.cancel(owed).expect(200);
    await house.pay(url);
    await tellAll(owed);
    await work('send-refund');
    expect(await refundedAtService(owed)).toEqual([2500]);
    const after = await standing(house, owed);
    expect([after.charge, after.refunds, after.balances]).toEqual(['void', ['settled'], {}]);
  });

  it('is paid back once when the service’s answer is lost', async () => {
    const owed = await house.owe();
    await payFor(owed);
    await house.cancel(owed).expect(200);
    await house.service.control({
      faults: [{ fault: { kind: 'cut' }, path: '/v1/refunds', times: 3 }],
    });
    const [job] = (await waiting('send-refund')).slice(-1);
    await expect(house.run('send-refund', job?.payload)).rejects.toThrow('did not answer');
    await house.run('send-refund', job?.payload);
    expect(await refundedAtService(owed)).toEqual([2500]);
    expect((await standing(house, owed)).refunds).toEqual(['settled']);
  });
});

describe('the ledger', () => {
  const steps = ['open', 'pay', 'tell', 'cancel', 'close', 'refund', 'reconcile'] as const;

  async function take(step: (typeof steps)[number], owed: Owed, urls: string[]): Promise<void> {
    const url = urls.at(-1);
    if (step === 'open') {
      const { body } = await house.checkout(owed);
      const page = (body as { url?: string }).url;
      if (page) urls.push(page);
    }
    if (step === 'pay' && url) await house.pay(url);
    if (step === 'tell') {
      for (const webhook of await house.webhooksOf(owed)) await house.tell(webhook).expect(200);
    }
    if (step === 'cancel') await house.cancel(owed);
    if (step === 'close') await work('close-attempt');
    if (step === 'refund') await work('send-refund');
    if (step === 'reconcile') {
      house.testApp.clock.advance(minutes(6));
      await house.run('reconcile-payments');
    }
  }

  it('balances, agrees with the service and with what is owed, whatever happens in whatever order', async () => {
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.constantFrom(...steps), { minLength: 3, maxLength: 9 }),
        async (taken) => {
          const owed = await house.owe();
          const urls: string[] = [];
          for (const step of taken) await take(step, owed, urls);
          // What is under way comes to its end.
          for (const step of ['reconcile', 'tell', 'close', 'refund', 'tell'] as const) {
            await take(step, owed, urls);
          }
          const { charge, balances } = await standing(house, owed);
          const total = Object.values(balances).reduce((sum, balance) => sum + balance, 0);
          const atService = Object.values((await house.service.state()).charges)
            .filter(({ metadata }) => metadata?.['charge_id'] === owed.chargeId)
            .reduce((sum, { amount, amount_refunded }) => sum + amount - amount_refunded, 0);
          expect(total).toBe(0);
          expect([balances['cash'] ?? 0, charge]).toEqual([atService, charge]);
          expect(balances['receivable'] ?? 0).toBe(charge === 'open' ? 2500 : 0);
        },
      ),
      { numRuns: Number(process.env['SOAK_RUNS'] ?? 25) },
    );
  }, 120_000);

  it('is never changed, and takes no journal with one side', async () => {
    for (const change of [
      'UPDATE ledger_entries SET debit_minor = 1',
      'DELETE FROM ledger_entries',
      'DELETE FROM payment_events',
    ]) {
      await expect(house.query(change)).rejects.toThrow(/permission denied/);
    }
    const alone = house.query(
      `INSERT INTO ledger_entries (id, journal_id, posting_key, account, debit_minor, currency)
       VALUES (gen_random_uuid(), gen_random_uuid(), 'alone', 'cash', 1, 'USD')`,
    );
    await expect(alone).rejects.toThrow(/does not balance/);
  });
});
