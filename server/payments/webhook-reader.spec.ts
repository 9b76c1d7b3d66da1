import Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import {
  formerSecret,
  openPaymentDesk,
  until,
  webhookSecret,
  type PaymentDesk,
} from '../../test/builders/payment-desk';

let desk: PaymentDesk;

beforeEach(async () => {
  desk = await openPaymentDesk();
});

afterEach(() => desk.close());

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
    desk.payments.readWebhook(Buffer.from(body), signature);

  it('pass when signed by the current secret, by the former one, or by both', () => {
    expect(read(sign(webhookSecret))).toMatchObject({ outcome: 'verified', kind: 'other' });
    expect(read(sign(formerSecret))).toMatchObject({ outcome: 'verified' });
    const [, second] = sign(webhookSecret).split(',');
    expect(read(`${sign('whsec_other')},${second}`)).toMatchObject({ outcome: 'verified' });
  });

  it.each([
    ['a flipped byte', () => read(sign(webhookSecret), payload.replace('ping', 'pong'))],
    [
      'a body written anew',
      () => read(sign(webhookSecret), JSON.stringify(JSON.parse(payload), null, 1)),
    ],
    ['a signature 301 s old', () => read(sign(webhookSecret, now - 301))],
    ['a foreign secret', () => read(sign('whsec_other'))],
    ['no signature', () => read(undefined)],
    ['nonsense', () => read('nonsense')],
    ['an empty body', () => read(sign(webhookSecret), '')],
  ])('are rejected with %s', (_, attempt) => {
    expect(attempt()).toMatchObject({ outcome: 'rejected' });
  });

  it('are sent again until they are taken', async () => {
    const session = await desk.open();
    desk.answers.push(500, 404, 302, 500);
    await desk.pay(session);
    await until(() => desk.received.length === 4 + 4);
    const types = new Set(desk.events().map(({ eventId }) => eventId));
    expect(types.size).toBe(4);
  });

  it('can be doubled, held, put in another order, lost and sent anew', async () => {
    await desk.control({ webhooks: { hold: true, copies: 2 } });
    await desk.pay(await desk.open());
    expect(desk.received).toEqual([]);
    const { events } = await desk.state();
    const wanted = Object.keys(events).reverse();
    const { deliveries } = await desk.control({ deliver: { events: wanted } });
    expect(deliveries).toEqual(wanted.map((eventId) => ({ eventId, status: 200 })));
    expect(desk.events().map(({ eventId }) => eventId)).toEqual(wanted);

    await desk.control({ deliver: { events: [wanted[0]], copies: 10, parallel: true } });
    expect(desk.received).toHaveLength(wanted.length + 10);

    await desk.control({ webhooks: { loseEvery: 1 } });
    await desk.pay(await desk.open({ attemptId: 'lost' }));
    expect(desk.received).toHaveLength(wanted.length + 10);
  });

  it('tell of an expired session, and bring types that are unknown', async () => {
    const session = await desk.open();
    await desk.control({ expire: session.sessionId });
    expect(await desk.eventOf('checkout.session.expired')).toMatchObject({
      kind: 'checkout-expired',
      session: { sessionId: session.sessionId, status: 'expired', paid: false },
    });
    expect((await fetch(`${desk.service.url}/c/pay/${session.sessionId}`)).status).toBe(410);
    await desk.control({ emit: { type: 'some.thing', object: { id: 'x' } } });
    expect(await desk.eventOf('some.thing')).toMatchObject({ kind: 'other' });
  });
});
