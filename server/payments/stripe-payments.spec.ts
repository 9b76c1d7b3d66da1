import { once } from 'node:events';
import { createServer, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { startPaymentService, type PaymentService } from '../fakes/payments/service';
import type { Book } from '../fakes/payments/book';
import type { CheckoutRequest, CheckoutSession, PaymentEvent, Payments } from './payments';
import { createPayments } from './stripe-payments';

const secret = 'whsec_current_0123456789';
const formerSecret = 'whsec_former_0123456789';
const key = 'sk_test_harborlane';

interface Received {
  body: Buffer;
  signature: string;
}

let service: PaymentService;
let payments: Payments;
let receiver: Server;
let received: Received[];
let answers: number[];

const request: CheckoutRequest = {
  chargeId: '0193f0aa-0000-7000-8000-000000000001',
  attemptId: '0193f0aa-0000-7000-8000-0000000000a1',
  amountMinor: 2500,
  currency: 'USD',
  successUrl: 'http://127.0.0.1:3000/payments/done?session={CHECKOUT_SESSION_ID}',
  cancelUrl: 'http://127.0.0.1:3000/payments',
};

beforeEach(async () => {
  received = [];
  answers = [];
  receiver = createServer((incoming, response) => {
    const parts: Buffer[] = [];
    incoming.on('data', (part: Buffer) => parts.push(part));
    incoming.on('end', () => {
      received.push({
        body: Buffer.concat(parts),
        signature: String(incoming.headers['stripe-signature']),
      });
      response.statusCode = answers.shift() ?? 200;
      response.end();
    });
  }).listen(0, '127.0.0.1');
  await once(receiver, 'listening');
  service = await startPaymentService({
    port: 0,
    stateFile: null,
    webhookUrl: `http://127.0.0.1:${(receiver.address() as AddressInfo).port}/hook`,
    webhookSecret: secret,
    apiKey: key,
    webhookWaits: [20],
  });
  payments = paymentsTo(service);
});

afterEach(async () => {
  await service.stop();
  receiver.closeAllConnections();
  receiver.close();
});

const endpointOf = ({ port }: PaymentService) => ({ host: '127.0.0.1', port });

function paymentsTo(target: PaymentService, timeoutMs = 2000): Payments {
  return createPayments(
    { secretKey: key, webhookSecrets: [secret, formerSecret], endpoint: endpointOf(target) },
    timeoutMs,
  );
}

async function control(body: object): Promise<{
  eventId: string | null;
  deliveries: { eventId: string; status: number }[];
}> {
  const response = await fetch(`${service.url}/_control`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  expect(response.status).toBe(200);
  return (await response.json()) as Awaited<ReturnType<typeof control>>;
}

async function state(): Promise<Book> {
  return (await (await fetch(`${service.url}/_state`)).json()) as Book;
}

async function open(change: Partial<CheckoutRequest> = {}): Promise<CheckoutSession> {
  const session = await payments.createCheckoutSession({ ...request, ...change });
  if (session.outcome !== 'session') throw new Error(session.detail);
  return session;
}

function pay(session: CheckoutSession, fields: Record<string, string> = {}): Promise<Response> {
  const card = { number: '4242 4242 4242 4242', expiry: '12/34', code: '123' };
  return fetch(session.url ?? '', {
    method: 'POST',
    body: new URLSearchParams({ ...card, ...fields }),
    redirect: 'manual',
  });
}

function verified(entry: Received): PaymentEvent {
  const event = payments.readWebhook(entry.body, entry.signature);
  if (event.outcome !== 'verified') throw new Error(event.detail);
  return event;
}

async function until<T>(read: () => T | undefined | false): Promise<T> {
  for (let round = 0; round < 400; round += 1) {
    const value = read();
    if (value) return value;
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
  throw new Error('It did not happen in 4 s.');
}

const eventOf = (type: string): Promise<PaymentEvent> =>
  until(() => received.map(verified).find((event) => event.type === type));

describe('one payment', () => {
  it('goes from session over pay page to signed webhooks', async () => {
    const session = await open();
    expect(session).toMatchObject({
      status: 'open',
      paid: false,
      amountMinor: 2500,
      currency: 'usd',
      paymentIntentId: null,
      chargeId: request.chargeId,
      attemptId: request.attemptId,
    });
    const page = await (await fetch(session.url ?? '')).text();
    expect(page).toContain('Pay $25.00');

    const paid = await pay(session);
    expect(paid.status).toBe(303);
    expect(paid.headers.get('location')).toBe(
      `http://127.0.0.1:3000/payments/done?session=${session.sessionId}`,
    );
    const completed = await eventOf('checkout.session.completed');
    expect(completed).toMatchObject({
      kind: 'checkout-completed',
      session: { sessionId: session.sessionId, paid: true, chargeId: request.chargeId },
    });
    expect(await eventOf('payment_intent.succeeded')).toMatchObject({
      kind: 'payment-succeeded',
      payment: { amountMinor: 2500, currency: 'usd', attemptId: request.attemptId },
    });
    expect(await payments.retrieveSession(session.sessionId)).toMatchObject({
      status: 'complete',
      paid: true,
      url: null,
    });
  });

  it('paid twice from two tabs is charged once', async () => {
    const session = await open();
    const both = await Promise.all([pay(session), pay(session)]);
    expect(both.map(({ status }) => status)).toEqual([303, 303]);
    expect(Object.values((await state()).charges)).toHaveLength(1);
  });

  it('declined first and paid with another card keeps one payment', async () => {
    const session = await open();
    const declined = await pay(session, { number: '4000 0000 0000 0002' });
    expect(declined.status).toBe(402);
    expect(await declined.text()).toContain('Your card was declined. Try another card.');
    expect(await eventOf('payment_intent.payment_failed')).toMatchObject({
      kind: 'payment-failed',
    });
    expect((await pay(session)).status).toBe(303);
    const { paymentIntents, charges } = await state();
    expect(Object.values(paymentIntents).map(({ status }) => status)).toEqual(['succeeded']);
    expect(Object.values(charges).map(({ status }) => status)).toEqual(['failed', 'succeeded']);
  });

  it('keeps no card number, and asks again for one that cannot be right', async () => {
    const session = await open();
    const wrong = await pay(session, { number: '4242 4242 4242 4241', expiry: '13/20', code: 'x' });
    expect(wrong.status).toBe(422);
    await pay(session);
    const kept = JSON.stringify(await state());
    expect(kept).not.toMatch(/4242\s?4242/);
    expect(kept).toContain('"last4":"4242"');
  });

  it('tells the service nothing but ids, an amount and the word Payment', async () => {
    await open();
    const { sessions, sessionDetails } = await state();
    const [session] = Object.values(sessions);
    expect(session?.metadata).toEqual({
      charge_id: request.chargeId,
      attempt_id: request.attemptId,
    });
    expect(Object.values(sessionDetails)).toEqual([
      { itemName: 'Payment', intentMetadata: session?.metadata, description: null },
    ]);
    expect(session?.customer_email).toBeNull();
  });
});

describe('an attempt asked for again', () => {
  it('gives the same session, 20 at once too', async () => {
    const sessions = await Promise.all(Array.from({ length: 20 }, () => open()));
    expect(new Set(sessions.map(({ sessionId }) => sessionId)).size).toBe(1);
  });

  it('with another amount is refused', async () => {
    await open();
    expect(await payments.createCheckoutSession({ ...request, amountMinor: 2600 })).toMatchObject({
      outcome: 'key-reused',
    });
  });

  it('after the connection was cut behind the deed gives that one', async () => {
    await control({ faults: [{ fault: { kind: 'cut' }, times: 1 }] });
    const session = await open();
    expect(Object.keys((await state()).sessions)).toEqual([session.sessionId]);
  });

  it('after an answer that came too late gives that one', async () => {
    payments = paymentsTo(service, 150);
    await control({ faults: [{ fault: { kind: 'late', milliseconds: 400 }, times: 1 }] });
    const session = await open();
    expect(Object.keys((await state()).sessions)).toEqual([session.sessionId]);
  });

  it('after a 500 that was not begun succeeds by itself', async () => {
    await control({ faults: [{ fault: { kind: 'refuse', status: 500 }, times: 1 }] });
    expect(await open()).toMatchObject({ status: 'open' });
  });

  it('after a failure kept under the key stays unavailable; a new attempt is free of it', async () => {
    await control({ faults: [{ fault: { kind: 'fail', status: 500 }, times: 1 }] });
    const failed = await payments.createCheckoutSession(request);
    expect(failed).toMatchObject({ outcome: 'unavailable' });
    expect(await payments.createCheckoutSession(request)).toMatchObject({ outcome: 'unavailable' });
    expect(await open({ attemptId: 'another-attempt' })).toMatchObject({ status: 'open' });
  });
});

describe('what goes wrong comes as an outcome', () => {
  it('when the service is down for all three tries', async () => {
    await control({ faults: [{ fault: { kind: 'refuse', status: 503 }, times: 3 }] });
    expect(await payments.createCheckoutSession(request)).toMatchObject({
      outcome: 'unavailable',
      requestId: expect.stringMatching(/^req_/),
    });
    expect(await open()).toMatchObject({ status: 'open' });
  });

  it('when nothing answers at all', async () => {
    await service.stop();
    expect(await payments.createCheckoutSession(request)).toMatchObject({
      outcome: 'unavailable',
      requestId: null,
    });
    service = await startPaymentService({
      port: 0,
      stateFile: null,
      webhookUrl: null,
      webhookSecret: secret,
    });
  });

  it('when it knows no such session', async () => {
    expect(await payments.retrieveSession('cs_test_none')).toMatchObject({ outcome: 'not-found' });
  });

  it('when the amount is below what it takes', async () => {
    expect(await payments.createCheckoutSession({ ...request, amountMinor: 49 })).toMatchObject({
      outcome: 'refused',
      code: 'amount_too_small',
    });
  });

  it('when a session is no longer open', async () => {
    const session = await open();
    await pay(session);
    expect(await payments.expireSession(session.sessionId)).toMatchObject({ outcome: 'refused' });
  });

  it('but a wrong key is thrown on, for it must be seen', async () => {
    const wrong = createPayments({
      secretKey: 'sk_test_wrong',
      webhookSecrets: [secret],
      endpoint: endpointOf(service),
    });
    await expect(wrong.createCheckoutSession(request)).rejects.toThrow(
      Stripe.errors.StripeAuthenticationError,
    );
  });

  it('and a live key is never sent to a stand-in', () => {
    expect(() =>
      createPayments({
        secretKey: 'sk_live_x',
        webhookSecrets: [secret],
        endpoint: endpointOf(service),
      }),
    ).toThrow('test key only');
  });
});

describe('refunds', () => {
  async function paidIntent(): Promise<string> {
    const session = await open();
    await pay(session);
    const { paymentIntents } = await state();
    return Object.keys(paymentIntents)[0] ?? '';
  }

  it('give back part and the rest, each once, never more than was paid', async () => {
    const paymentIntentId = await paidIntent();
    const refund = (refundId: string, amountMinor: number) =>
      payments.createRefund({ refundId, chargeId: request.chargeId, paymentIntentId, amountMinor });
    const first = await refund('refund-1', 1000);
    expect(first).toMatchObject({ outcome: 'refund', status: 'succeeded', amountMinor: 1000 });
    expect(await refund('refund-1', 1000)).toEqual(first);
    expect(await refund('refund-2', 1501)).toMatchObject({ outcome: 'refused' });
    expect(await refund('refund-3', 1500)).toMatchObject({ outcome: 'refund' });
    expect(await refund('refund-4', 1)).toMatchObject({
      outcome: 'refused',
      code: 'charge_already_refunded',
    });
    const { balanceTransactions } = await state();
    const balance = Object.values(balanceTransactions).reduce((sum, { amount }) => sum + amount, 0);
    expect(balance).toBe(0);
    await until(
      () => received.map(verified).filter((e) => e.kind === 'charge-refunded').length > 1,
    );
    const refunded = received
      .map(verified)
      .flatMap((event) => (event.kind === 'charge-refunded' ? [event.refundedMinor] : []));
    expect(refunded.sort((a, b) => a - b)).toEqual([1000, 2500]);
  });

  it('twenty at once give back no more than was paid', async () => {
    const paymentIntentId = await paidIntent();
    const outcomes = await Promise.all(
      Array.from({ length: 20 }, (_, index) =>
        payments.createRefund({
          refundId: `refund-${index}`,
          chargeId: request.chargeId,
          paymentIntentId,
          amountMinor: 300,
        }),
      ),
    );
    expect(outcomes.filter(({ outcome }) => outcome === 'refund')).toHaveLength(8);
    expect(Object.values((await state()).charges)[0]?.amount_refunded).toBe(2400);
  });
});

describe('webhooks', () => {
  const payload = JSON.stringify({
    id: 'evt_1',
    object: 'event',
    type: 'ping',
    created: 1,
    data: { object: {} },
  });
  const now = Math.floor(Date.now() / 1000);
  const sign = (by: string, timestamp = now): string =>
    Stripe.webhooks.generateTestHeaderString({ payload, secret: by, timestamp });
  const read = (signature: string | undefined, body = payload) =>
    payments.readWebhook(Buffer.from(body), signature);

  it('pass when signed by the current secret, by the former one, or by both', () => {
    expect(read(sign(secret))).toMatchObject({ outcome: 'verified', kind: 'other' });
    expect(read(sign(formerSecret))).toMatchObject({ outcome: 'verified' });
    const [, second] = sign(secret).split(',');
    expect(read(`${sign('whsec_other')},${second}`)).toMatchObject({ outcome: 'verified' });
  });

  it.each([
    ['a flipped byte', () => read(sign(secret), payload.replace('ping', 'pong'))],
    ['a body written anew', () => read(sign(secret), JSON.stringify(JSON.parse(payload), null, 1))],
    ['a signature 301 s old', () => read(sign(secret, now - 301))],
    ['a foreign secret', () => read(sign('whsec_other'))],
    ['no signature', () => read(undefined)],
    ['nonsense', () => read('nonsense')],
    ['an empty body', () => read(sign(secret), '')],
  ])('are rejected with %s', (_, attempt) => {
    expect(attempt()).toMatchObject({ outcome: 'rejected' });
  });

  it('are sent again until they are taken', async () => {
    const session = await open();
    answers = [500, 404, 302, 500];
    await pay(session);
    await until(() => received.length === 4 + 4);
    const types = new Set(received.map(verified).map(({ eventId }) => eventId));
    expect(types.size).toBe(4);
  });

  it('can be doubled, held, put in another order, lost and sent anew', async () => {
    await control({ webhooks: { hold: true, copies: 2 } });
    await pay(await open());
    expect(received).toEqual([]);
    const { events } = await state();
    const wanted = Object.keys(events).reverse();
    const { deliveries } = await control({ deliver: { events: wanted } });
    expect(deliveries).toEqual(wanted.map((eventId) => ({ eventId, status: 200 })));
    expect(received.map((entry) => verified(entry).eventId)).toEqual(wanted);

    await control({ deliver: { events: [wanted[0]], copies: 10, parallel: true } });
    expect(received).toHaveLength(wanted.length + 10);

    await control({ webhooks: { loseEvery: 1 } });
    await pay(await open({ attemptId: 'lost' }));
    expect(received).toHaveLength(wanted.length + 10);
  });

  it('tell of an expired session, and bring types that are unknown', async () => {
    const session = await open();
    await control({ expire: session.sessionId });
    expect(await eventOf('checkout.session.expired')).toMatchObject({
      kind: 'checkout-expired',
      session: { sessionId: session.sessionId, status: 'expired', paid: false },
    });
    expect((await fetch(`${service.url}/c/pay/${session.sessionId}`)).status).toBe(410);
    await control({ emit: { type: 'some.thing', object: { id: 'x' } } });
    expect(await eventOf('some.thing')).toMatchObject({ kind: 'other' });
  });
});
