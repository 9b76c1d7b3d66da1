import { setTimeout as sleep } from 'node:timers/promises';
import Stripe from 'stripe';
import * as z from 'zod';
import type { Book, Delivery } from './book';
import { makeId, type ServiceEvent } from './objects';

const second = 1000;
/** Waits before each further try; the last is repeated until three days have passed. */
const usualWaits = [1, 2, 5, 10, 30, 60, 120, 300].map((seconds) => seconds * second);
const mostTries = Math.ceil((3 * 24 * 3600) / 300);
const answerWithin = 10 * second;

/** Standing rules of delivery, for tests of what a network does to webhooks. */
export const deliveryRules = z.strictObject({
  /** Keeps events back until they are delivered by hand, in any order. */
  hold: z.boolean().default(false),
  /** Loses each n-th event for good; 0 loses none. */
  loseEvery: z.int().min(0).default(0),
  /** Sends each event so many times. */
  copies: z.int().min(1).max(20).default(1),
});
type DeliveryRules = z.output<typeof deliveryRules>;

export interface WebhookSettings {
  url: string | null;
  secret: string;
  /** Milliseconds before each further try; tests shorten them. */
  waits?: readonly number[];
}

export interface Webhooks {
  setRules(rules: DeliveryRules): void;
  /** Plans the delivery of a new event. */
  plan(event: ServiceEvent): void;
  /** Sends one event now, once; answers the receiver's status, 0 when there was none. */
  send(event: ServiceEvent): Promise<number>;
  /** Goes on with what was waiting, at the start of the process. */
  resume(): void;
  stop(): void;
}

/**
 * Delivers events to one address until it answers 2xx, signed as the SDK's own test header does.
 * @param book where deliveries are kept, so that they survive a restart
 * @param save writes the book
 */
export function createWebhooks(
  settings: WebhookSettings,
  book: () => Book,
  save: () => Promise<void>,
): Webhooks {
  const waits = settings.waits ?? usualWaits;
  const timers = new Map<string, NodeJS.Timeout>();
  let rules: DeliveryRules = deliveryRules.parse({});
  let planned = 0;

  const send = async (event: ServiceEvent): Promise<number> => {
    if (settings.url === null) return 0;
    const payload = JSON.stringify(event, null, 2);
    const signature = Stripe.webhooks.generateTestHeaderString({
      payload,
      secret: settings.secret,
    });
    try {
      const response = await fetch(settings.url, {
        method: 'POST',
        headers: {
          'content-type': 'application/json; charset=utf-8',
          'stripe-signature': signature,
        },
        body: payload,
        redirect: 'manual',
        signal: AbortSignal.timeout(answerWithin),
      });
      await response.arrayBuffer();
      return response.status;
    } catch {
      return 0;
    }
  };

  const attempt = async (delivery: Delivery): Promise<void> => {
    const event = book().events[delivery.eventId];
    if (!event) return;
    delivery.lastStatus = await send(event);
    delivery.attempts += 1;
    if (delivery.lastStatus >= 200 && delivery.lastStatus < 300) {
      delivery.state = 'delivered';
      event.pending_webhooks = Math.max(0, event.pending_webhooks - 1);
    } else if (delivery.attempts >= mostTries) {
      delivery.state = 'given-up';
    } else {
      delivery.nextAttemptAt =
        Date.now() + (waits[Math.min(delivery.attempts, waits.length) - 1] ?? second);
      schedule(delivery);
    }
    await save();
  };

  const schedule = (delivery: Delivery): void => {
    if (delivery.state !== 'waiting' || settings.url === null) return;
    const timer = setTimeout(
      () => {
        timers.delete(delivery.id);
        attempt(delivery).catch((error: unknown) => console.error('webhook', error));
      },
      Math.max(0, delivery.nextAttemptAt - Date.now()),
    );
    timers.set(delivery.id, timer);
  };

  const stop = (): void => {
    for (const timer of timers.values()) clearTimeout(timer);
    timers.clear();
  };

  return {
    setRules(next) {
      rules = next;
    },
    plan(event) {
      planned += 1;
      const lost = rules.loseEvery > 0 && planned % rules.loseEvery === 0;
      const state = lost ? 'dropped' : rules.hold ? 'held' : 'waiting';
      for (let copy = 0; copy < rules.copies; copy += 1) {
        const id = makeId('del');
        const delivery: Delivery = {
          id,
          eventId: event.id,
          attempts: 0,
          nextAttemptAt: Date.now(),
          state,
          lastStatus: null,
        };
        book().deliveries[id] = delivery;
        schedule(delivery);
      }
    },
    send,
    resume() {
      for (const delivery of Object.values(book().deliveries)) schedule(delivery);
    },
    stop,
  };
}

/** How a test asks for events to be sent by hand. */
export const handDelivery = z.strictObject({
  /** Event ids in the order wanted, or all that are held, oldest first. */
  events: z.union([z.literal('held'), z.array(z.string()).min(1).max(100)]),
  copies: z.int().min(1).max(100).default(1),
  parallel: z.boolean().default(false),
  /** Milliseconds between two sendings, when one by one. */
  pause: z.int().min(0).max(10_000).default(0),
});

export interface HandDelivered {
  eventId: string;
  status: number;
}

/** Sends events by hand and tells how each was answered; held ones count as delivered then. */
export async function deliverByHand(
  request: z.output<typeof handDelivery>,
  book: Book,
  webhooks: Pick<Webhooks, 'send'>,
): Promise<HandDelivered[]> {
  const held = Object.values(book.deliveries).filter(({ state }) => state === 'held');
  const ids = request.events === 'held' ? held.map(({ eventId }) => eventId) : request.events;
  for (const delivery of held) if (ids.includes(delivery.eventId)) delivery.state = 'delivered';
  const queue = ids.flatMap((id) => {
    const event = book.events[id];
    return event ? Array.from({ length: request.copies }, () => event) : [];
  });
  const sendOne = async (event: ServiceEvent): Promise<HandDelivered> => ({
    eventId: event.id,
    status: await webhooks.send(event),
  });
  if (request.parallel) return Promise.all(queue.map(sendOne));
  const results: HandDelivered[] = [];
  for (const event of queue) {
    results.push(await sendOne(event));
    if (request.pause > 0) await sleep(request.pause);
  }
  return results;
}
