import type { Router } from 'express';
import { formatMoney } from '@shared/units/money';
import * as z from 'zod';
import {
  ApiError,
  formExpand,
  formInteger,
  formMetadata,
  missing,
  parameterError,
  readParameters,
} from './api-error';
import { onShelf } from './book';
import type { Desk } from './desk';
import { endpoint, type Call } from './endpoint';
import { paymentIntent } from './payment-intent';
import { listParameters, page } from './lists';
import { makeId, type Charge, type Refund } from './objects';
import { enterBalance } from './paying';

const createParameters = z.strictObject({
  charge: z.string().optional(),
  payment_intent: z.string().optional(),
  amount: formInteger.pipe(z.int().min(1)).optional(),
  reason: z.enum(['duplicate', 'fraudulent', 'requested_by_customer']).optional(),
  metadata: formMetadata,
  expand: formExpand,
});

export function refundRoutes(desk: Desk, router: Router): void {
  router.post('/v1/refunds', endpoint(desk, createRefund));
  router.get('/v1/refunds', endpoint(desk, listRefunds));
  router.get('/v1/refunds/:id', endpoint(desk, readRefund));
}

function createRefund(desk: Desk, call: Call): Refund {
  const input = readParameters(createParameters, call.input);
  const charge = chargeOf(desk, input);
  const left = charge.amount - charge.amount_refunded;
  if (left === 0) {
    throw new ApiError(400, 'invalid_request_error', {
      code: 'charge_already_refunded',
      message: `Charge ${charge.id} has already been refunded.`,
    });
  }
  const amount = input.amount ?? left;
  if (amount > left) {
    throw new ApiError(400, 'invalid_request_error', {
      message: `Refund amount (${formatMoney(amount, charge.currency)}) is greater than unrefunded amount on charge (${formatMoney(left, charge.currency)})`,
      param: 'amount',
    });
  }
  const refund: Refund = {
    id: makeId('re'),
    object: 'refund',
    amount,
    balance_transaction: null,
    charge: charge.id,
    created: desk.now(),
    currency: charge.currency,
    metadata: input.metadata,
    payment_intent: charge.payment_intent,
    reason: input.reason ?? null,
    status: 'succeeded',
  };
  refund.balance_transaction = enterBalance(desk, 'refund', -amount, refund);
  desk.book.refunds[refund.id] = refund;
  const before = charge.amount_refunded;
  charge.amount_refunded += amount;
  charge.refunded = charge.amount_refunded === charge.amount;
  desk.emit('refund.created', refund, call);
  desk.emit('charge.refunded', charge, call, { amount_refunded: before });
  return refund;
}

function chargeOf(
  desk: Desk,
  { charge, payment_intent: intent }: z.output<typeof createParameters>,
): Charge {
  if ((charge === undefined) === (intent === undefined)) {
    throw parameterError(
      'parameter_missing',
      'One of the following params should be provided for this request: payment_intent or charge.',
      'charge',
    );
  }
  if (charge !== undefined) {
    const found = onShelf(desk.book.charges, charge);
    if (!found) throw missing('charge', charge, 'charge');
    return found;
  }
  const payment = paymentIntent(desk, intent ?? null);
  if (!payment) throw missing('payment_intent', intent ?? '', 'payment_intent');
  const latest = onShelf(desk.book.charges, payment.latest_charge);
  if (!latest?.paid) {
    throw new ApiError(400, 'invalid_request_error', {
      message: `This PaymentIntent (${payment.id}) does not have a successful charge to refund.`,
    });
  }
  return latest;
}

const refundFilters = listParameters.extend({
  charge: z.string().optional(),
  payment_intent: z.string().optional(),
});

function listRefunds(desk: Desk, call: Call): object {
  const { charge, payment_intent: intent, ...list } = readParameters(refundFilters, call.input);
  const found = Object.values(desk.book.refunds).filter(
    (refund) =>
      (charge === undefined || refund.charge === charge) &&
      (intent === undefined || refund.payment_intent === intent),
  );
  return page('/v1/refunds', found, list);
}

function readRefund(desk: Desk, call: Call): Refund {
  readParameters(z.strictObject({ expand: formExpand }), call.input);
  const id = call.path['id'] ?? '';
  const refund = onShelf(desk.book.refunds, id);
  if (!refund) throw missing('refund', id);
  return refund;
}
