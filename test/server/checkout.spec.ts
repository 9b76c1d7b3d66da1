import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { agentFor } from '../builders/agent';
import { throughGate } from '../builders/gate';
import {
  COMPLETED,
  openPaymentHouse,
  paid,
  shown,
  standing,
  type PaymentHouse,
} from '../builders/payment-house';
import { buildUser } from '../builders/people';
import { startServerProcess } from '../builders/server-process';
import { minutes } from '../builders/test-clock';
import { webhookSecret } from '../builders/payment-desk';

/** `npm run soak` raises this. */
const KILLS = Number(process.env['SOAK_KILLS'] ?? 3);

let house: PaymentHouse;

beforeAll(async () => {
  house = await openPaymentHouse();
});
afterAll(() => house.close());

const urlOf = ({ body }: { body: unknown }): string => (body as { url: string }).url;

const sessionsOf = async (chargeId: string) =>
  Object.values((await house.service.state()).sessions).filter(
    ({ metadata }) => metadata?.['charge_id'] === chargeId,
  );

describe('a class that the patient pays', () => {
  it('is charged in the booking, on both sides of the ledger', async () => {
    const owed = await house.owe();
    expect(await standing(house, owed)).toEqual({
      charge: 'open',
      payments: [],
      refunds: [],
      balances: { receivable: 2500, income: -2500 },
      receipts: 0,
    });
    const { body } = await owed.payer.get('/api/charges').expect(200);
    const { items } = body as { items: { id: string; amountMinor: number }[] };
    expect(items.map(({ id, amountMinor }) => [id, amountMinor])).toEqual([[owed.chargeId, 2500]]);
  });

  it('is not paid at another price than was shown', async () => {
    const owed = await house.owe();
    const path = `/api/charges/${owed.chargeId}/checkout`;
    for (const other of [{ amountMinor: 2499 }, { currency: 'EUR' }]) {
      const reply = await owed.payer.post(path).send({ ...shown, ...other });
      expect([reply.status, (reply.body as { code: string }).code]).toEqual([409, 'price-changed']);
    }
    for (const amountMinor of [0, -2500, 25.5, '2500']) {
      await owed.payer
        .post(path)
        .send({ ...shown, amountMinor })
        .expect(422);
    }
    expect(await sessionsOf(owed.chargeId)).toEqual([]);
  });

  it('has one pay page, however many ask at once, from two servers, a patient and the desk', async () => {
    const owed = await house.owe();
    const twin = house.testApp.twin();
    const desk = await buildUser(house.testApp.context.database, {
      roles: ['front-desk'],
      siteIds: await house
        .query<{ id: string }>('SELECT id FROM sites')
        .then((rows) => rows.map(({ id }) => id)),
    });
    const agents = [owed.payer, house.frontDesk, await agentFor(twin, desk)];
    const gate = {
      lock: 'SELECT FROM charges WHERE id = $1 FOR UPDATE',
      values: [owed.chargeId],
      until: 10,
    };
    const replies = await throughGate(house.testApp, gate, () =>
      Array.from({ length: 50 }, (_, n) => house.checkout(owed, agents[n % agents.length])),
    );
    expect([...new Set(replies.map(({ status }) => status))]).toEqual([200]);
    expect(new Set(replies.map(urlOf)).size).toBe(1);
    expect(await sessionsOf(owed.chargeId)).toHaveLength(1);
    const [first] = replies;
    await house.pay(first ? urlOf(first) : '');
    for (const webhook of await house.webhooksOf(owed, COMPLETED))
      await house.tell(webhook).expect(200);
    expect(await standing(house, owed)).toEqual(paid);
    await house.checkout(owed).expect(409);
    await twin.close();
  });

  it('gets a new page when the former expired', async () => {
    const owed = await house.owe();
    const first = urlOf(await house.checkout(owed).expect(200));
    const [session] = await sessionsOf(owed.chargeId);
    await house.service.control({ expire: session?.id });
    const second = urlOf(await house.checkout(owed).expect(200));
    expect(second).not.toBe(first);
    expect((await standing(house, owed)).payments).toEqual(['expired', 'pending']);
  });
});

describe('a payment service that fails', () => {
  it.each([
    ['answers too late', { kind: 'late', milliseconds: 4000 }],
    ['cuts the line after the deed', { kind: 'cut' }],
    ['refuses at first', { kind: 'refuse', status: 503 }],
  ])('makes one page when it %s', async (_, fault) => {
    const owed = await house.owe();
    // The SDK asks three times by itself.
    await house.service.control({ faults: [{ fault, path: '/v1/checkout/sessions', times: 3 }] });
    const failed = await house.checkout(owed);
    expect([failed.status, failed.headers['retry-after']]).toEqual([503, '5']);
    const url = urlOf(await house.checkout(owed).expect(200));
    expect(await sessionsOf(owed.chargeId)).toHaveLength(1);
    await house.pay(url);
    for (const webhook of await house.webhooksOf(owed, COMPLETED))
      await house.tell(webhook).expect(200);
    expect(await standing(house, owed)).toEqual(paid);
  });

  it('that keeps failing under one key is asked with another after half a minute', async () => {
    const owed = await house.owe();
    const fault = { kind: 'fail', status: 500 };
    await house.service.control({ faults: [{ fault, path: '/v1/checkout/sessions' }] });
    await house.checkout(owed).expect(503);
    house.testApp.clock.advance(31_000);
    await house.checkout(owed).expect(503);
    await house.checkout(owed).expect(200);
    expect((await standing(house, owed)).payments).toEqual(['failed', 'pending']);
  });

  it('charges once when the server is killed between its call and its commit', async () => {
    for (let kill = 0; kill < KILLS; kill += 1) {
      const owed = await house.owe();
      const server = await startServerProcess(house.testApp, 'UTC', {
        STRIPE_SECRET_KEY: 'sk_test_harborlane',
        STRIPE_WEBHOOK_SECRET: webhookSecret,
        STRIPE_API_BASE: house.service.service.url,
        // What the service is asked for must be the same, or the same key is refused.
        PLIMSOLL_ORIGIN: house.testApp.context.settings.origin,
      });
      const fault = { kind: 'late', milliseconds: 3000 };
      await house.service.control({ faults: [{ fault, path: '/v1/checkout/sessions' }] });
      const cookies = Object.entries(owed.payer.cookies);
      const call = fetch(`${server.origin}/api/charges/${owed.chargeId}/checkout`, {
        method: 'POST',
        headers: {
          'Content-Type': 'application/json',
          'X-XSRF-TOKEN': owed.payer.cookies['XSRF-TOKEN'] ?? '',
          Cookie: cookies.map(([name, value]) => `${name}=${encodeURIComponent(value)}`).join('; '),
        },
        body: JSON.stringify(shown),
      }).catch(() => null);
      for (
        let tries = 0;
        tries < 200 && (await sessionsOf(owed.chargeId)).length === 0;
        tries += 1
      ) {
        await new Promise((resolve) => setTimeout(resolve, 10));
      }
      expect(await sessionsOf(owed.chargeId)).toHaveLength(1);
      await server.kill();
      await call;
      expect((await standing(house, owed)).payments).toEqual(['preparing']);
      const url = urlOf(await house.checkout(owed).expect(200));
      expect(await sessionsOf(owed.chargeId)).toHaveLength(1);
      await house.pay(url);
      for (const webhook of await house.webhooksOf(owed, COMPLETED))
        await house.tell(webhook).expect(200);
      expect(await standing(house, owed)).toEqual(paid);
      const { charges } = await house.service.state();
      const made = Object.values(charges).filter(
        ({ metadata }) => metadata?.['charge_id'] === owed.chargeId,
      );
      expect(made).toHaveLength(1);
    }
  }, 120_000);

  it('loses no payment when it tells of none: the server asks', async () => {
    const owed = await house.owe();
    await house.pay(urlOf(await house.checkout(owed).expect(200)));
    await house.run('reconcile-payments');
    expect((await standing(house, owed)).charge).toBe('open');
    house.testApp.clock.advance(minutes(6));
    await Promise.all([house.run('reconcile-payments'), house.run('reconcile-payments')]);
    expect(await standing(house, owed)).toEqual(paid);
  });
});
