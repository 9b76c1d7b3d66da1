import Stripe from 'stripe';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { cardNumbersIn } from '../builders/card-numbers';
import { formerSecret, webhookSecret } from '../builders/payment-desk';
import {
  COMPLETED,
  openPaymentHouse,
  paid,
  standing,
  type Owed,
  type PaymentHouse,
  type Webhook,
} from '../builders/payment-house';
import { takeAway } from '../builders/take-away';

let house: PaymentHouse;

beforeAll(async () => {
  house = await openPaymentHouse();
});
afterAll(() => house.close());

const sign = (payload: string, secret: string, secondsAgo = 0): string =>
  Stripe.webhooks.generateTestHeaderString({
    payload,
    secret,
    timestamp: Math.floor(Date.now() / 1000) - secondsAgo,
  });

const signed = (event: object): Webhook => {
  const payload = JSON.stringify(event);
  return { body: Buffer.from(payload), signature: sign(payload, webhookSecret) };
};

/** A charge that was paid at the service, of which nothing was told yet. */
async function paidUntold(): Promise<{ owed: Owed; webhooks: Webhook[] }> {
  const owed = await house.owe();
  const { body } = await house.checkout(owed).expect(200);
  await house.pay((body as { url: string }).url);
  return { owed, webhooks: await house.webhooksOf(owed, COMPLETED) };
}

const typeOf = ({ body }: Webhook): string =>
  (JSON.parse(body.toString('utf8')) as { type: string }).type;

const eventCount = async (): Promise<number> =>
  (await house.query<{ count: number }>('SELECT count(*)::int AS count FROM payment_events'))[0]
    ?.count ?? -1;

const idOf = ({ body }: Webhook): string =>
  (JSON.parse(body.toString('utf8')) as { id: string }).id;

/** How many rows stand for these events. */
const keptOf = async (webhooks: readonly Webhook[]): Promise<number> =>
  (
    await house.query<{ count: number }>(
      'SELECT count(*)::int AS count FROM payment_events WHERE id = ANY ($1)',
      webhooks.map(idOf),
    )
  )[0]?.count ?? -1;

function orders<T>(items: readonly T[]): T[][] {
  if (items.length < 2) return [[...items]];
  return items.flatMap((item, at) =>
    orders(items.filter((_, other) => other !== at)).map((rest) => [item, ...rest]),
  );
}

describe('a signature', () => {
  const payload = JSON.stringify({
    id: 'evt_shape',
    object: 'event',
    type: 'a.b',
    created: 1,
    data: { object: {} },
  });
  const good = () => sign(payload, webhookSecret);
  const [, value = ''] = sign(payload, webhookSecret).split('v1=');

  it.each([
    ['an altered byte', () => payload.replace('evt_shape', 'evt_shapf'), good],
    ['the same JSON, written anew', () => JSON.stringify(JSON.parse(payload), null, 1), good],
    ['a signature 301 seconds old', () => payload, () => sign(payload, webhookSecret, 301)],
    ['another secret', () => payload, () => sign(payload, 'whsec_of_someone_else_012345')],
    ['no value of the scheme in use', () => payload, () => good().replace('v1=', 'v0=')],
    [
      'two values, both wrong',
      () => payload,
      () =>
        `t=${Math.floor(Date.now() / 1000)},v1=${value.replace(/./g, '0')},v1=${value.replace(/./g, '1')}`,
    ],
    ['no time', () => payload, () => `v1=${value}`],
    ['an empty header', () => payload, () => ''],
  ])('does not hold with %s, and leaves no row', async (_, body, signature) => {
    const before = await eventCount();
    await house.tell({ body: Buffer.from(body()), signature: signature() }).expect(400);
    expect(await eventCount()).toBe(before);
  });

  it('holds by the former secret, and beside a wrong value', async () => {
    const before = await eventCount();
    const event = (id: string) => payload.replace('evt_shape', id);
    const former = event('evt_former');
    await house
      .tell({ body: Buffer.from(former), signature: sign(former, formerSecret) })
      .expect(200);
    const two = event('evt_two');
    const beside = sign(two, webhookSecret).replace('v1=', `v1=${value},v1=`);
    await house.tell({ body: Buffer.from(two), signature: beside }).expect(200);
    expect(await eventCount()).toBe(before + 2);
  });

  it('is asked before anything else, and more than 256 kB are not read', async () => {
    const large = Buffer.alloc(256 * 1024 + 1, ' ');
    await house.tell({ body: large, signature: good() }).expect(413);
  });

  it('lets events pass that we know nothing of', async () => {
    for (const [id, type] of [
      ['evt_x1', 'customer.created'],
      ['evt_x2', 'payment_intent.succeeded'],
    ]) {
      const object = {
        id: 'pi_of_others',
        object: 'payment_intent',
        amount: 100,
        currency: 'usd',
        metadata: {},
      };
      await house
        .tell(signed({ id, object: 'event', type, created: 1, data: { object } }))
        .expect(200);
    }
  });
});

describe('what the service tells', () => {
  it('counts once, told ten times, five at a time', async () => {
    const { owed, webhooks } = await paidUntold();
    const twin = house.testApp.twin();
    for (const webhook of webhooks) {
      for (const _ of ['first', 'second']) {
        const replies = await Promise.all(
          Array.from({ length: 5 }, (_, n) => house.tell(webhook, n % 2 ? twin : house.testApp)),
        );
        expect(replies.map(({ status }) => status)).toEqual([200, 200, 200, 200, 200]);
      }
    }
    await twin.close();
    expect(await standing(house, owed)).toEqual(paid);
    expect(await keptOf(webhooks)).toBe(webhooks.length);
    const audited = await house.query(
      `SELECT FROM audit_events WHERE action = 'payment.settled' AND object_id = $1`,
      owed.chargeId,
    );
    expect(audited).toHaveLength(1);
  });

  it('comes to the same in every order, an expiry that came too late included', async () => {
    const first = await paidUntold();
    const told = first.webhooks.filter((webhook) =>
      ['checkout.session.completed', 'payment_intent.succeeded'].includes(typeOf(webhook)),
    );
    expect(told).toHaveLength(2);
    for (let n = 0; n < orders(['a', 'b', 'c', 'd']).length; n += 1) {
      const { owed, webhooks } = n === 0 ? first : await paidUntold();
      const relevant = webhooks.filter((webhook) =>
        told.some((one) => typeOf(one) === typeOf(webhook)),
      );
      const completed = webhooks.find(
        (webhook) => typeOf(webhook) === 'checkout.session.completed',
      );
      const { data, ...event } = JSON.parse(completed?.body.toString('utf8') ?? '{}') as {
        data: { object: object };
      };
      const late = { ...data.object, status: 'expired', payment_status: 'unpaid' };
      const expired = signed({
        ...event,
        id: `evt_expired_${n}`,
        type: 'checkout.session.expired',
        data: { object: late },
      });
      const created = signed({
        ...event,
        id: `evt_created_${n}`,
        type: 'payment_intent.created',
        data,
      });
      const order = orders([...relevant, expired, created])[n] ?? [];
      for (const webhook of order) await house.tell(webhook).expect(200);
      expect([order.map(typeOf), await standing(house, owed)]).toEqual([order.map(typeOf), paid]);
    }
  }, 120_000);

  it('settles before our own call has written down its session', async () => {
    const { owed, webhooks } = await paidUntold();
    await house.query(
      `UPDATE payments SET status = 'preparing', service_session_id = NULL, service_session_url = NULL WHERE charge_id = $1`,
      owed.chargeId,
    );
    for (const webhook of webhooks) await house.tell(webhook).expect(200);
    expect(await standing(house, owed)).toEqual(paid);
  });

  it('settles nothing when another amount was paid than was asked', async () => {
    const { owed, webhooks } = await paidUntold();
    const [webhook] = webhooks.filter((one) => typeOf(one) === 'checkout.session.completed');
    const event = JSON.parse(webhook?.body.toString('utf8') ?? '{}') as {
      id: string;
      data: { object: { amount_total: number } };
    };
    event.id = 'evt_other_amount';
    event.data.object.amount_total = 1;
    await house.tell(signed(event)).expect(200);
    expect((await standing(house, owed)).charge).toBe('open');
    const audited = await house.query(
      `SELECT FROM audit_events WHERE action = 'payment.amount-differs' AND object_id = $1`,
      owed.chargeId,
    );
    expect(audited).toHaveLength(1);
  });
});

describe('what is nobody’s business', () => {
  it('holds no card number, in no table and no line of the log', async () => {
    const { webhooks } = await paidUntold();
    for (const webhook of webhooks) await house.tell(webhook).expect(200);
    expect(await cardNumbersIn(house)).toEqual([]);
  });

  it('would show a card number that stood in a table or in a line of the log', async () => {
    const address = 'spaced@people.example';
    await house.query(
      'INSERT INTO suppressions (address, reason) VALUES ($1, $2)',
      address,
      'said 4242 4242 4242 4242',
    );
    expect(await cardNumbersIn(house)).toEqual(['4242 4242 4242 4242']);
    await house.query('DELETE FROM suppressions WHERE address = $1', address);
    house.testApp.context.log.info({ detail: 'card 5555555555554444 refused' }, 'for a spec');
    expect(await cardNumbersIn(house)).toEqual(['5555555555554444']);
  });

  it('tells the service ids, an amount and the word Payment', async () => {
    const { owed } = await paidUntold();
    const book = await house.service.state();
    const about = Object.values(book.sessions).find(
      ({ metadata }) => metadata?.['charge_id'] === owed.chargeId,
    );
    expect(Object.keys(about?.metadata ?? {}).sort()).toEqual(['attempt_id', 'charge_id']);
    const [person] = await house.query<{ family_name: string; record_number: string }>(
      'SELECT family_name, record_number FROM patients WHERE id = $1',
      owed.patientId,
    );
    const everything = JSON.stringify(book);
    expect(everything).toContain('"itemName":"Payment"');
    for (const word of [person?.family_name, person?.record_number, owed.patientId]) {
      expect(everything).not.toContain(word);
    }
    expect(everything).not.toMatch(/maintenance|class|exercise|cardi|rehab|heart/i);
  });
});

describe('without the key of the events', () => {
  beforeAll(() =>
    takeAway(house.testApp, 'ALTER TABLE payment_events DROP CONSTRAINT payment_events_pkey'),
  );

  it('an event that is told twice is taken in twice, and what it pays is still paid once', async () => {
    const { owed, webhooks } = await paidUntold();
    for (const webhook of [...webhooks, ...webhooks]) await house.tell(webhook).expect(200);
    expect(await keptOf(webhooks)).toBe(2 * webhooks.length);
    expect(await standing(house, owed)).toEqual(paid);
  });
});
