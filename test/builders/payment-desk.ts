import { once } from 'node:events';
import { createServer } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Book } from '../../server/fakes/payments/book';
import { startPaymentService, type PaymentService } from '../../server/fakes/payments/service';
import type {
  CheckoutRequest,
  CheckoutSession,
  PaymentEvent,
  Payments,
} from '../../server/payments/payments';
import { createPayments } from '../../server/payments/stripe-payments';

export const webhookSecret = 'whsec_current_0123456789';
export const formerSecret = 'whsec_former_0123456789';
const key = 'sk_test_harborlane';

export const checkoutRequest: CheckoutRequest = {
  chargeId: '0193f0aa-0000-7000-8000-000000000001',
  attemptId: '0193f0aa-0000-7000-8000-0000000000a1',
  amountMinor: 2500,
  currency: 'USD',
  successUrl: 'http://127.0.0.1:3000/payments/done?session={CHECKOUT_SESSION_ID}',
  cancelUrl: 'http://127.0.0.1:3000/payments',
};

interface Received {
  body: Buffer;
  signature: string;
}

interface Controlled {
  eventId: string | null;
  deliveries: { eventId: string; status: number }[];
}

/** The stand-in of the payment service, the adapter to it, and a receiver of its webhooks. */
export interface PaymentDesk {
  readonly service: PaymentService;
  readonly payments: Payments;
  /** Every webhook received so far. */
  readonly received: readonly Received[];
  /** Statuses with which the next webhooks are answered; 200 when there are none left. */
  readonly answers: number[];
  /** Another adapter to the same service. */
  paymentsWithin(timeoutMs: number): Payments;
  control(body: object): Promise<Controlled>;
  state(): Promise<Book>;
  open(change?: Partial<CheckoutRequest>): Promise<CheckoutSession>;
  /** Fills in the pay page as a payer does; by default with a card that pays. */
  pay(session: CheckoutSession, fields?: Record<string, string>): Promise<Response>;
  /** The webhooks received so far, each verified. */
  events(): PaymentEvent[];
  /** Waits until an event of this type has come. */
  eventOf(type: string): Promise<PaymentEvent>;
  close(): Promise<void>;
}

export async function openPaymentDesk(): Promise<PaymentDesk> {
  const received: Received[] = [];
  const answers: number[] = [];
  const receiver = await receive(received, answers);
  const service = await startPaymentService({
    port: 0,
    stateFile: null,
    webhookUrl: receiver.url,
    webhookSecret,
    apiKey: key,
    webhookWaits: [20],
  });
  const paymentsWithin = (timeoutMs: number): Payments =>
    createPayments(
      {
        secretKey: key,
        webhookSecrets: [webhookSecret, formerSecret],
        endpoint: { host: '127.0.0.1', port: service.port },
      },
      timeoutMs,
    );
  const payments = paymentsWithin(2000);
  const events = (): PaymentEvent[] =>
    received.map(({ body, signature }) => {
      const event = payments.readWebhook(body, signature);
      if (event.outcome !== 'verified') throw new Error(event.detail);
      return event;
    });
  return {
    service,
    payments,
    received,
    answers,
    paymentsWithin,
    control: (body) => control(service, body),
    async state() {
      return (await (await fetch(`${service.url}/_state`)).json()) as Book;
    },
    async open(change = {}) {
      const session = await payments.createCheckoutSession({ ...checkoutRequest, ...change });
      if (session.outcome !== 'session') throw new Error(session.detail);
      return session;
    },
    pay,
    events,
    eventOf: (type) => until(() => events().find((event) => event.type === type)),
    async close() {
      await service.stop();
      receiver.close();
    },
  };
}

async function receive(
  received: Received[],
  answers: number[],
): Promise<{ url: string; close(): void }> {
  const server = createServer((incoming, response) => {
    const parts: Buffer[] = [];
    incoming.on('data', (part: Buffer) => parts.push(part));
    incoming.on('end', () => {
      const signature = incoming.headers['stripe-signature'];
      received.push({ body: Buffer.concat(parts), signature: String(signature) });
      response.statusCode = answers.shift() ?? 200;
      response.end();
    });
  }).listen(0, '127.0.0.1');
  await once(server, 'listening');
  return {
    url: `http://127.0.0.1:${(server.address() as AddressInfo).port}/hook`,
    close() {
      server.closeAllConnections();
      server.close();
    },
  };
}

async function control(service: PaymentService, body: object): Promise<Controlled> {
  const response = await fetch(`${service.url}/_control`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify(body),
  });
  if (!response.ok) throw new Error(await response.text());
  return (await response.json()) as Controlled;
}

function pay(session: CheckoutSession, fields: Record<string, string> = {}): Promise<Response> {
  const card = { number: '4242 4242 4242 4242', expiry: '12/34', code: '123' };
  return fetch(session.url ?? '', {
    method: 'POST',
    body: new URLSearchParams({ ...card, ...fields }),
    redirect: 'manual',
  });
}

/** Asks again each 10 ms, for 4 s at most. */
export async function until<T>(read: () => T | undefined | false): Promise<T> {
  for (let round = 0; round < 400; round += 1) {
    const value = read();
    if (value) return value;
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
  throw new Error('It did not happen in 4 s.');
}
