import { randomUUID } from 'node:crypto';
import request, { type Test } from 'supertest';
import { featureJobs } from '../../server/features';
import type { Payments } from '../../server/payments/payments';
import { agentFor, type Agent } from './agent';
import { buildPrice } from './money';
import { openPaymentDesk, type PaymentDesk } from './payment-desk';
import { buildSite, buildUser } from './people';
import { buildBooker, buildClassDate } from './schedule';
import { createTestApp, type TestApp } from './test-app';
import { testClock } from './test-clock';

/** An open charge for a class that is booked, and the browser of who owes it. */
export interface Owed {
  readonly chargeId: string;
  readonly appointmentId: string;
  readonly patientId: string;
  readonly payer: Agent;
}

/** As it came over the wire. */
export interface Webhook {
  readonly body: Buffer;
  readonly signature: string;
}

export interface PaymentHouse {
  readonly testApp: TestApp;
  readonly service: PaymentDesk;
  /** The front desk of the only site. */
  readonly frontDesk: Agent;
  /** Books a class of twenty-five dollars. @param daysAhead local days; 0 is a class in three hours */
  readonly owe: (daysAhead?: number) => Promise<Owed>;
  readonly checkout: (owed: Owed, agent?: Agent) => Test;
  readonly pay: (url: string) => Promise<void>;
  /** Hands a webhook to the server as the service does. */
  readonly tell: (webhook: Webhook, to?: TestApp) => Test;
  /** Every webhook about a charge that came so far. @param awaited the type of one that is waited for, 4 s at most */
  readonly webhooksOf: (owed: Owed, awaited?: string) => Promise<Webhook[]>;
  readonly cancel: (owed: Owed, agent?: Agent) => Test;
  readonly run: (job: string, payload?: object) => Promise<void>;
  readonly query: <T extends object>(sql: string, ...values: unknown[]) => Promise<T[]>;
  readonly close: () => Promise<void>;
}

export const COMPLETED = 'checkout.session.completed';

export const shown = { amountMinor: 2500, currency: 'USD' };

/**
 * The server with a payment service beside it; its clock starts at the present.
 * @param through what stands between the two
 */
export async function openPaymentHouse(
  through: (payments: Payments) => Payments = (payments) => payments,
): Promise<PaymentHouse> {
  const service = await openPaymentDesk();
  const clock = testClock(new Date().toISOString());
  const testApp = await createTestApp({ payments: through(service.payments), clock });
  const { database } = testApp.context;
  const site = await buildSite(database, { timeZone: 'UTC' });
  const price = await buildPrice(database);
  const desk = await buildUser(database, { roles: ['front-desk'], siteIds: [site.id] });
  const frontDesk = await agentFor(testApp, desk);

  const query = async <T extends object>(sql: string, ...values: unknown[]): Promise<T[]> =>
    (await database.$client.query<T>(sql, values)).rows;

  const owe = async (daysAhead = 6): Promise<Owed> => {
    const start = new Date(clock.now().getTime() + (daysAhead * 24 + 3) * 3_600_000).toISOString();
    const { user, patient } = await buildBooker(database, site);
    const date = await buildClassDate(database, site, {
      localDate: start.slice(0, 10),
      localStart: start.slice(11, 16),
      priceItemId: price.id,
    });
    const payer = await agentFor(testApp, user);
    const { body } = await payer
      .post('/api/appointments')
      .set('Idempotency-Key', randomUUID())
      .send({ classDateId: date.id })
      .expect(201);
    const appointmentId = (body as { id: string }).id;
    const [charge] = await query<{ id: string }>(
      'SELECT id FROM charges WHERE appointment_id = $1',
      appointmentId,
    );
    return { chargeId: charge?.id ?? '', appointmentId, patientId: patient.id, payer };
  };

  return {
    testApp,
    service,
    frontDesk,
    owe,
    query,
    checkout: ({ chargeId, payer }, agent = payer) =>
      agent.post(`/api/charges/${chargeId}/checkout`).send(shown),
    pay: async (url) => {
      await service.pay({ url } as Parameters<PaymentDesk['pay']>[0]);
    },
    tell: ({ body, signature }, to = testApp) =>
      request(to.app)
        .post('/api/payments/webhook')
        .set('Content-Type', 'application/json')
        .set('Stripe-Signature', signature)
        .send(body.toString('utf8')),
    webhooksOf: async ({ chargeId }, awaited) => {
      const about = () => service.received.filter(({ body }) => body.includes(chargeId));
      const hasCome = () => !awaited || about().some(({ body }) => body.includes(awaited));
      for (let tries = 0; tries < 400 && !hasCome(); tries += 1) {
        await new Promise((resolve) => setTimeout(resolve, 10));
      }
      return about();
    },
    cancel: ({ appointmentId, payer }, agent = payer) =>
      agent.patch(`/api/appointments/${appointmentId}`).send({ status: 'cancelled', version: 1 }),
    run: async (name, payload = {}) => {
      const job = featureJobs.find((one) => one.name === name);
      if (!job) throw new Error(`There is no job ${name}`);
      await job.run(payload, testApp.context);
    },
    close: async () => {
      await testApp.close();
      await service.close();
    },
  };
}

/** How a charge stands, with everything that hangs on it. */
export async function standing({ query }: PaymentHouse, { chargeId }: Owed) {
  const [charge] = await query<{ status: string }>(
    'SELECT status FROM charges WHERE id = $1',
    chargeId,
  );
  const payments = await query<{ id: string; status: string }>(
    'SELECT id, status FROM payments WHERE charge_id = $1 ORDER BY created_at, id',
    chargeId,
  );
  const refunds = await query<{ id: string; status: string }>(
    'SELECT r.id, r.status FROM refunds r JOIN payments p ON p.id = r.payment_id WHERE p.charge_id = $1',
    chargeId,
  );
  const ledger = await query<{ account: string; balance: number }>(
    `SELECT account::text, sum(debit_minor - credit_minor)::int AS balance
       FROM ledger_entries WHERE charge_id = $1 GROUP BY account`,
    chargeId,
  );
  const balances = Object.fromEntries(
    ledger.filter(({ balance }) => balance !== 0).map(({ account, balance }) => [account, balance]),
  );
  const receipts = await query(
    `SELECT FROM outbox WHERE kind = 'receipt' AND subject->>'paymentId' IN
       (SELECT id::text FROM payments WHERE charge_id = $1)`,
    chargeId,
  );
  return {
    charge: charge?.status,
    payments: payments.map(({ status }) => status),
    refunds: refunds.map(({ status }) => status),
    balances,
    receipts: receipts.length,
  };
}

export const paid = {
  charge: 'paid',
  payments: ['settled'],
  refunds: [],
  balances: { income: -2500, cash: 2500 },
  receipts: 1,
};
