import { mkdtemp, rm } from 'node:fs/promises';
import { createServer } from 'node:http';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { startPaymentService, type PaymentService } from './service';

const webhookSecret = 'whsec_0123456789abcdef';

let folder: string;
let service: PaymentService;
let stripe: Stripe;

beforeEach(async () => {
  folder = await mkdtemp(join(tmpdir(), 'payments-'));
  await start(null);
});

afterEach(async () => {
  await service.stop();
  await rm(folder, { recursive: true });
});

const known = {
  id: 'pi_demo_1',
  amount: 1800,
  currency: 'usd',
  metadata: { charge_id: 'c1', attempt_id: 'a1' },
};

async function start(webhookUrl: string | null): Promise<void> {
  service = await startPaymentService({
    port: 0,
    stateFile: join(folder, 'payments.json'),
    webhookUrl,
    webhookSecret,
    webhookWaits: [10],
    knownPayments: [known],
  });
  stripe = new Stripe('sk_test_any', {
    host: '127.0.0.1',
    port: service.port,
    protocol: 'http',
    telemetry: false,
    maxNetworkRetries: 0,
  });
}

const create = (amount = 2500): Promise<Stripe.Checkout.Session> =>
  stripe.checkout.sessions.create({
    mode: 'payment',
    line_items: [
      {
        quantity: 1,
        price_data: { currency: 'usd', unit_amount: amount, product_data: { name: '<b>Fee</b>' } },
      },
    ],
    success_url: 'http://127.0.0.1:3000/done',
    cancel_url: 'http://127.0.0.1:3000/back?a=1&b="2"',
  });

const pay = (session: Stripe.Checkout.Session): Promise<Response> =>
  fetch(session.url ?? '', {
    method: 'POST',
    body: new URLSearchParams({ number: '4242424242424242', expiry: '12/34', code: '123' }),
    redirect: 'manual',
  });

function sourceOf(entry: Stripe.BalanceTransaction | undefined): string {
  return typeof entry?.source === 'string' ? entry.source : '';
}

describe('the SDK raises its own typed errors', () => {
  it('for a parameter that is unknown, missing or wrong', async () => {
    const call = (parameters: object): Promise<unknown> =>
      stripe.checkout.sessions.create(parameters);
    const base = { mode: 'payment', success_url: 'http://127.0.0.1/' };
    const unknown = await call({ ...base, colour: 'red' }).catch((error: unknown) => error);
    expect(unknown).toBeInstanceOf(Stripe.errors.StripeInvalidRequestError);
    const item = { quantity: 1, price_data: { currency: 'zzz', unit_amount: 100 } };
    await expect(call({ ...base, line_items: [item] })).rejects.toMatchObject({
      param: expect.stringContaining('line_items[0][price_data]'),
    });
    await expect(call({ mode: 'payment' })).rejects.toMatchObject({ code: 'parameter_missing' });
    await expect(create(-1)).rejects.toThrow(Stripe.errors.StripeInvalidRequestError);
  });

  it('for a live key, a foreign id and too many calls', async () => {
    const live = new Stripe('sk_live_any', {
      host: '127.0.0.1',
      port: service.port,
      protocol: 'http',
    });
    await expect(live.events.list()).rejects.toThrow(Stripe.errors.StripeAuthenticationError);
    for (const id of ['pi_none', 'constructor', '__proto__']) {
      await expect(stripe.paymentIntents.retrieve(id)).rejects.toMatchObject({
        code: 'resource_missing',
        statusCode: 404,
        requestId: expect.stringMatching(/^req_\w{24}$/),
      });
    }
    await fetch(`${service.url}/_control`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ faults: [{ fault: { kind: 'refuse', status: 429 } }] }),
    });
    await expect(stripe.events.list()).rejects.toThrow(Stripe.errors.StripeRateLimitError);
  });
});

it('keeps a refusal under its key, but not one of parameters', async () => {
  const session = await create();
  await pay(session);
  const [charge] = (await stripe.balanceTransactions.list({ type: 'charge' })).data;
  const refund = (amount: number): Promise<Stripe.Refund> =>
    stripe.refunds.create(
      { charge: sourceOf(charge), amount },
      { idempotencyKey: `refund ${amount}` },
    );
  await expect(refund(2501)).rejects.toThrow('greater than unrefunded amount');
  await expect(refund(2501)).rejects.toMatchObject({
    headers: { 'idempotent-replayed': 'true' },
  });
  await expect(refund(0)).rejects.toThrow('Invalid amount');
  await expect(refund(0)).rejects.not.toHaveProperty('headers.idempotent-replayed');
});

it('pages, filters and expands', async () => {
  for (let round = 0; round < 5; round += 1) await pay(await create(2500 + round));
  const ids: string[] = [];
  for await (const event of stripe.events.list({ type: 'payment_intent.succeeded', limit: 2 })) {
    ids.push(event.id);
  }
  expect(new Set(ids).size).toBe(5);
  const { data } = await stripe.checkout.sessions.list({
    status: 'complete',
    expand: ['data.payment_intent.latest_charge'],
  });
  const intent = data[0]?.payment_intent as Stripe.PaymentIntent;
  expect(intent.latest_charge).toMatchObject({ object: 'charge', amount: 2504, paid: true });
  const total = await stripe.balanceTransactions.list({ limit: 100 });
  expect(total.data.reduce((sum, entry) => sum + entry.net, 0)).toBe(12_510);
});

it('survives a restart, with the webhooks that nobody took yet', async () => {
  let taken = 0;
  const receiver = createServer((incoming, response) => {
    incoming.resume();
    taken += 1;
    response.end();
  });
  await service.stop();
  await start('http://127.0.0.1:9/nobody');
  const session = await create();
  const unpaid = await create();
  await pay(session);
  await service.stop();
  await new Promise<void>((resolve) => receiver.listen(0, '127.0.0.1', resolve));
  const address = receiver.address();
  const port = typeof address === 'object' ? address?.port : 0;
  await start(`http://127.0.0.1:${port}/hook`);
  expect(await stripe.checkout.sessions.retrieve(session.id)).toMatchObject({ status: 'complete' });
  const open = await stripe.checkout.sessions.retrieve(unpaid.id);
  expect(open.url).toBe(`${service.url}/c/pay/${unpaid.id}`);
  for (let round = 0; round < 200 && taken < 4; round += 1) {
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
  expect(taken).toBe(4);
  receiver.closeAllConnections();
  receiver.close();
});

it('gives back once what was paid elsewhere, also after a reset', async () => {
  await fetch(`${service.url}/_reset`, { method: 'POST' });
  const asked = { payment_intent: known.id, amount: 1800 };
  const refund = await stripe.refunds.create(asked, { idempotencyKey: 'r1' });
  expect(refund).toMatchObject({ status: 'succeeded', amount: 1800 });
  await expect(stripe.refunds.create(asked, { idempotencyKey: 'r2' })).rejects.toMatchObject({
    code: 'charge_already_refunded',
  });
  const intent = await stripe.paymentIntents.retrieve(known.id);
  expect(intent.metadata).toEqual(known.metadata);
  await expect(stripe.paymentIntents.retrieve('pi_demo_2')).rejects.toMatchObject({
    code: 'resource_missing',
  });
});

it('resets, and answers its controls to this machine only', async () => {
  await create();
  const foreign = await fetch(`${service.url}/_reset`, {
    method: 'POST',
    headers: { 'sec-fetch-site': 'cross-site' },
  });
  expect(foreign.status).toBe(403);
  expect((await stripe.checkout.sessions.list()).data).toHaveLength(1);
  expect((await fetch(`${service.url}/_reset`, { method: 'POST' })).status).toBe(204);
  expect((await stripe.checkout.sessions.list()).data).toEqual([]);
});

it('lets the form of its pay page lead on to the address of success', async () => {
  const response = await fetch((await create()).url ?? '');
  expect(response.headers.get('content-security-policy')).toContain(
    "form-action 'self' http://127.0.0.1:3000;",
  );
});
