import type { Router } from 'express';
import * as z from 'zod';
import { formExpand, missing, readParameters } from './api-error';
import { onShelf } from './book';
import type { Desk } from './desk';
import { endpoint, type Call } from './endpoint';
import { paymentIntent } from './payment-intent';
import { listParameters, page } from './lists';

/** What is only read: payments, charges, events and movements of money. */
export function readRoutes(desk: Desk, router: Router): void {
  router.get('/v1/payment_intents/:id', endpoint(desk, one('payment_intent', paymentIntent)));
  router.get(
    '/v1/charges/:id',
    endpoint(
      desk,
      one('charge', ({ book }, id) => onShelf(book.charges, id)),
    ),
  );
  router.get(
    '/v1/events/:id',
    endpoint(
      desk,
      one('event', ({ book }, id) => onShelf(book.events, id)),
    ),
  );
  router.get('/v1/events', endpoint(desk, listEvents));
  router.get(
    '/v1/balance_transactions/:id',
    endpoint(
      desk,
      one('balance_transaction', ({ book }, id) => onShelf(book.balanceTransactions, id)),
    ),
  );
  router.get('/v1/balance_transactions', endpoint(desk, listBalance));
}

function one(kind: string, find: (desk: Desk, id: string) => object | undefined) {
  return (desk: Desk, call: Call): object => {
    readParameters(z.strictObject({ expand: formExpand }), call.input);
    const id = call.path['id'] ?? '';
    const found = find(desk, id);
    if (!found) throw missing(kind, id);
    return found;
  };
}

const eventFilters = listParameters.extend({
  type: z.string().optional(),
  types: z.array(z.string()).max(20).optional(),
});

function listEvents(desk: Desk, call: Call): object {
  const { type, types, ...list } = readParameters(eventFilters, call.input);
  const wanted = types ?? (type === undefined ? undefined : [type]);
  const found = Object.values(desk.book.events).filter(
    (event) => wanted === undefined || wanted.includes(event.type),
  );
  return page('/v1/events', found, list);
}

const balanceFilters = listParameters.extend({
  type: z.enum(['charge', 'refund']).optional(),
  source: z.string().optional(),
});

function listBalance(desk: Desk, call: Call): object {
  const { type, source, ...list } = readParameters(balanceFilters, call.input);
  const found = Object.values(desk.book.balanceTransactions).filter(
    (entry) =>
      (type === undefined || entry.type === type) &&
      (source === undefined || entry.source === source),
  );
  return page('/v1/balance_transactions', found, list);
}
