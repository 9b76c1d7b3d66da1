import Stripe from 'stripe';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import {
  checkoutRequest,
  openPaymentDesk,
  until,
  webhookSecret,
  type PaymentDesk,
} from '../../test/builders/payment-desk';
import { createPayments } from './stripe-payments';

let desk: PaymentDesk;

beforeEach(async () => {
  desk = await openPaymentDesk();
});

afterEach(() => desk.close());

describe('a refund', () => {
  it('is read as it stands, and one that there is not is not found', async () => {
    const session = await desk.open();
    await desk.pay(session);
    const { paymentIntentId } = (await desk.payments.retrieveSession(
      session.sessionId,
    )) as typeof session;
    const made = await desk.payments.createRefund({
      refundId: '0193f0aa-0000-7000-8000-0000000000b1',
      chargeId: checkoutRequest.chargeId,
      paymentIntentId: paymentIntentId ?? '',
      amountMinor: 2500,
    });
    if (made.outcome !== 'refund') throw new Error(made.outcome);
    expect(await desk.payments.retrieveRefund(made.serviceRefundId)).toEqual(made);
    expect(await desk.payments.retrieveRefund('re_none')).toMatchObject({ outcome: 'not-found' });
  });
});

describe('one payment', () => {
  it('goes from session over pay page to signed webhooks', async () => {
    const session = await desk.open();
    expect(session).toMatchObject({
      status: 'open',
      paid: false,
      amountMinor: 2500,
      currency: 'usd',
      paymentIntentId: null,
      chargeId: checkoutRequest.chargeId,
      attemptId: checkoutRequest.attemptId,
    });
    const page = await (await fetch(session.url ?? '')).text();
    expect(page).toContain('Pay $25.00');

    const paid = await desk.pay(session);
    expect(paid.status).toBe(303);
    expect(paid.headers.get('location')).toBe(
      `http://127.0.0.1:3000/payments/done?session=${session.sessionId}`,
    );
    const completed = await desk.eventOf('checkout.session.completed');
    expect(completed).toMatchObject({
      kind: 'checkout-completed',
      session: { sessionId: session.sessionId, paid: true, chargeId: checkoutRequest.chargeId },
    });
    expect(await desk.eventOf('payment_intent.succeeded')).toMatchObject({
      kind: 'payment-succeeded',
      payment: { amountMinor: 2500, currency: 'usd', attemptId: checkoutRequest.attemptId },
    });
    expect(await desk.payments.retrieveSession(session.sessionId)).toMatchObject({
      status: 'complete',
      paid: true,
      url: null,
    });
  });

  it('paid twice from two tabs is charged once', async () => {
    const session = await desk.open();
    const both = await Promise.all([desk.pay(session), desk.pay(session)]);
    expect(both.map(({ status }) => status)).toEqual([303, 303]);
    expect(Object.values((await desk.state()).charges)).toHaveLength(1);
  });

  it('declined first and paid with another card keeps one payment', async () => {
    const session = await desk.open();
    const declined = await desk.pay(session, { number: '4000 0000 0000 0002' });
    expect(declined.status).toBe(402);
    expect(await declined.text()).toContain('Your card was declined. Try another card.');
    expect(await desk.eventOf('payment_intent.payment_failed')).toMatchObject({
      kind: 'payment-failed',
    });
    expect((await desk.pay(session)).status).toBe(303);
    const { paymentIntents, charges } = await desk.state();
    expect(Object.values(paymentIntents).map(({ status }) => status)).toEqual(['succeeded']);
    expect(Object.values(charges).map(({ status }) => status)).toEqual(['failed', 'succeeded']);
  });

  it('keeps no card number, and asks again for one that cannot be right', async () => {
    const session = await desk.open();
    const wrong = await desk.pay(session, {
      number: '4242 4242 4242 4241',
      expiry: '13/20',
      code: 'x',
    });
    expect(wrong.status).toBe(422);
    await desk.pay(session);
    const kept = JSON.stringify(await desk.state());
    expect(kept).not.toMatch(/4242\s?4242/);
    expect(kept).toContain('"last4":"4242"');
  });

  it('tells the service nothing but ids, an amount and the word Payment', async () => {
    await desk.open();
    const { sessions, sessionDetails } = await desk.state();
    const [session] = Object.values(sessions);
    expect(session?.metadata).toEqual({
      charge_id: checkoutRequest.chargeId,
      attempt_id: checkoutRequest.attemptId,
    });
    expect(Object.values(sessionDetails)).toEqual([
      { itemName: 'Payment', intentMetadata: session?.metadata, description: null },
    ]);
    expect(session?.customer_email).toBeNull();
  });
});

describe('an attempt asked for again', () => {
  it('gives the same session, 20 at once too', async () => {
    const sessions = await Promise.all(Array.from({ length: 20 }, () => desk.open()));
    expect(new Set(sessions.map(({ sessionId }) => sessionId)).size).toBe(1);
  });

  it('with another amount is refused', async () => {
    await desk.open();
    expect(
      await desk.payments.createCheckoutSession({ ...checkoutRequest, amountMinor: 2600 }),
    ).toMatchObject({
      outcome: 'key-reused',
    });
  });

  it('after the connection was cut behind the deed gives that one', async () => {
    await desk.control({ faults: [{ fault: { kind: 'cut' }, times: 1 }] });
    const session = await desk.open();
    expect(Object.keys((await desk.state()).sessions)).toEqual([session.sessionId]);
  });

  it('after an answer that came too late gives that one', async () => {
    const hasty = desk.paymentsWithin(150);
    await desk.control({ faults: [{ fault: { kind: 'late', milliseconds: 400 }, times: 1 }] });
    const session = await hasty.createCheckoutSession(checkoutRequest);
    expect(session).toMatchObject({ outcome: 'session', status: 'open' });
    expect(Object.keys((await desk.state()).sessions)).toHaveLength(1);
  });

  it('after a 500 that was not begun succeeds by itself', async () => {
    await desk.control({ faults: [{ fault: { kind: 'refuse', status: 500 }, times: 1 }] });
    expect(await desk.open()).toMatchObject({ status: 'open' });
  });

  it('after a failure kept under the key stays unavailable; a new attempt is free of it', async () => {
    await desk.control({ faults: [{ fault: { kind: 'fail', status: 500 }, times: 1 }] });
    const failed = await desk.payments.createCheckoutSession(checkoutRequest);
    expect(failed).toMatchObject({ outcome: 'unavailable' });
    expect(await desk.payments.createCheckoutSession(checkoutRequest)).toMatchObject({
      outcome: 'unavailable',
    });
    expect(await desk.open({ attemptId: 'another-attempt' })).toMatchObject({ status: 'open' });
  });
});

describe('what goes wrong comes as an outcome', () => {
  it('when the service is down for all three tries', async () => {
    await desk.control({ faults: [{ fault: { kind: 'refuse', status: 503 }, times: 3 }] });
    expect(await desk.payments.createCheckoutSession(checkoutRequest)).toMatchObject({
      outcome: 'unavailable',
      requestId: expect.stringMatching(/^req_/),
    });
    expect(await desk.open()).toMatchObject({ status: 'open' });
  });

  it('when nothing answers at all', async () => {
    await desk.service.stop();
    expect(await desk.payments.createCheckoutSession(checkoutRequest)).toMatchObject({
      outcome: 'unavailable',
      requestId: null,
    });
  });

  it('when it knows no such session', async () => {
    expect(await desk.payments.retrieveSession('cs_test_none')).toMatchObject({
      outcome: 'not-found',
    });
  });

  it('when the amount is below what it takes', async () => {
    expect(
      await desk.payments.createCheckoutSession({ ...checkoutRequest, amountMinor: 49 }),
    ).toMatchObject({
      outcome: 'refused',
      code: 'amount_too_small',
    });
  });

  it('when a session is no longer open', async () => {
    const session = await desk.open();
    await desk.pay(session);
    expect(await desk.payments.expireSession(session.sessionId)).toMatchObject({
      outcome: 'refused',
    });
  });

  it('but a wrong key is thrown on, for it must be seen', async () => {
    const wrong = createPayments({
      secretKey: 'sk_test_wrong',
      webhookSecrets: [webhookSecret],
      endpoint: { host: '127.0.0.1', port: desk.service.port },
    });
    await expect(wrong.createCheckoutSession(checkoutRequest)).rejects.toThrow(
      Stripe.errors.StripeAuthenticationError,
    );
  });

  it('and a live key is never sent to a stand-in', () => {
    expect(() =>
      createPayments({
        secretKey: 'sk_live_x',
        webhookSecrets: [webhookSecret],
        endpoint: { host: '127.0.0.1', port: desk.service.port },
      }),
    ).toThrow('test key only');
  });
});

describe('refunds', () => {
  async function paidIntent(): Promise<string> {
    const session = await desk.open();
    await desk.pay(session);
    const { paymentIntents } = await desk.state();
    return Object.keys(paymentIntents)[0] ?? '';
  }

  it('give back part and the rest, each once, never more than was paid', async () => {
    const paymentIntentId = await paidIntent();
    const refund = (refundId: string, amountMinor: number) =>
      desk.payments.createRefund({
        refundId,
        chargeId: checkoutRequest.chargeId,
        paymentIntentId,
        amountMinor,
      });
    const first = await refund('refund-1', 1000);
    expect(first).toMatchObject({ outcome: 'refund', status: 'succeeded', amountMinor: 1000 });
    expect(await refund('refund-1', 1000)).toEqual(first);
    expect(await refund('refund-2', 1501)).toMatchObject({ outcome: 'refused' });
    expect(await refund('refund-3', 1500)).toMatchObject({ outcome: 'refund' });
    expect(await refund('refund-4', 1)).toMatchObject({
      outcome: 'refused',
      code: 'charge_already_refunded',
    });
    const { balanceTransactions } = await desk.state();
    const balance = Object.values(balanceTransactions).reduce((sum, { amount }) => sum + amount, 0);
    expect(balance).toBe(0);
    await until(() => desk.events().filter((e) => e.kind === 'charge-refunded').length > 1);
    const refunded = desk
      .events()
      .flatMap((event) => (event.kind === 'charge-refunded' ? [event.refundedMinor] : []));
    expect(refunded.sort((a, b) => a - b)).toEqual([1000, 2500]);
  });

  it('twenty at once give back no more than was paid', async () => {
    const paymentIntentId = await paidIntent();
    const outcomes = await Promise.all(
      Array.from({ length: 20 }, (_, index) =>
        desk.payments.createRefund({
          refundId: `refund-${index}`,
          chargeId: checkoutRequest.chargeId,
          paymentIntentId,
          amountMinor: 300,
        }),
      ),
    );
    expect(outcomes.filter(({ outcome }) => outcome === 'refund')).toHaveLength(8);
    expect(Object.values((await desk.state()).charges)[0]?.amount_refunded).toBe(2400);
  });
});
