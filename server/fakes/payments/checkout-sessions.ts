import type { Router } from 'express';
import { minorUnitDigits } from '@shared/units/money';
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
import { listParameters, page } from './lists';
import { makeId, type Session } from './objects';

const hour = 3600;
/** The least that the service charges in most currencies: half a unit. */
const leastMajor = 0.5;

const url = z.url({ protocol: /^https?$/ }).max(5000);

const currency = z
  .string()
  .regex(/^[a-zA-Z]{3}$/, 'Invalid currency')
  .transform((code) => code.toLowerCase())
  .refine(
    (code) => Intl.supportedValuesOf('currency').includes(code.toUpperCase()),
    'Invalid currency',
  );

const lineItem = z.strictObject({
  quantity: formInteger.pipe(z.int().min(1)).default(1),
  price_data: z.strictObject({
    currency,
    unit_amount: formInteger,
    product_data: z.strictObject({
      name: z.string().min(1).max(250),
      description: z.string().max(1000).optional(),
    }),
  }),
});

const createParameters = z.strictObject({
  mode: z.literal('payment'),
  line_items: z.array(lineItem).min(1).max(100),
  success_url: url,
  cancel_url: url.optional(),
  client_reference_id: z.string().max(200).optional(),
  customer_email: z.email().optional(),
  expires_at: formInteger.optional(),
  metadata: formMetadata,
  payment_method_types: z.array(z.literal('card')).optional(),
  payment_intent_data: z
    .strictObject({ metadata: formMetadata, description: z.string().max(1000).optional() })
    .default({ metadata: {} }),
  expand: formExpand,
});
type CreateParameters = z.output<typeof createParameters>;

export function checkoutSessionRoutes(desk: Desk, router: Router): void {
  router.post('/v1/checkout/sessions', endpoint(desk, createSession));
  router.get('/v1/checkout/sessions', endpoint(desk, listSessions));
  router.get('/v1/checkout/sessions/:id', endpoint(desk, readSession));
  router.post('/v1/checkout/sessions/:id/expire', endpoint(desk, expireOnRequest));
}

function createSession(desk: Desk, call: Call): Session {
  const input = readParameters(createParameters, call.input);
  const now = desk.now();
  const expiresAt = input.expires_at ?? now + 24 * hour;
  if (expiresAt < now + hour / 2 || expiresAt > now + 24 * hour) {
    throw parameterError(
      'parameter_invalid',
      'The `expires_at` timestamp must be between 30 minutes and 24 hours from now.',
      'expires_at',
    );
  }
  const { amount, currency: code } = total(input);
  const id = makeId('cs_test');
  const session: Session = {
    id,
    object: 'checkout.session',
    amount_subtotal: amount,
    amount_total: amount,
    cancel_url: input.cancel_url ?? null,
    client_reference_id: input.client_reference_id ?? null,
    created: now,
    currency: code,
    customer: null,
    customer_email: input.customer_email ?? null,
    expires_at: expiresAt,
    livemode: false,
    metadata: input.metadata,
    mode: 'payment',
    payment_intent: null,
    payment_method_types: ['card'],
    payment_status: 'unpaid',
    status: 'open',
    success_url: input.success_url,
    ui_mode: 'hosted_page',
    url: payPageAddress(desk, id),
  };
  desk.book.sessions[id] = session;
  desk.book.sessionDetails[id] = {
    itemName: input.line_items.map((item) => item.price_data.product_data.name).join(', '),
    intentMetadata: input.payment_intent_data.metadata,
    description: input.payment_intent_data.description ?? null,
  };
  return session;
}

/** Where a payer's browser finds a session's page. */
export function payPageAddress(desk: Desk, sessionId: string): string {
  return `${desk.settings.publicUrl}/c/pay/${sessionId}`;
}

function total(input: CreateParameters): { amount: number; currency: string } {
  const codes = new Set(input.line_items.map((item) => item.price_data.currency));
  const [code] = codes;
  if (code === undefined || codes.size > 1) {
    throw parameterError(
      'parameter_invalid',
      'All line items must have the same currency.',
      'line_items',
    );
  }
  const amount = input.line_items.reduce(
    (sum, item) => sum + item.price_data.unit_amount * item.quantity,
    0,
  );
  const least = Math.ceil(leastMajor * 10 ** minorUnitDigits(code));
  if (amount < least) {
    throw new ApiError(
      400,
      'invalid_request_error',
      {
        code: 'amount_too_small',
        message: `The Checkout Session's total amount due must add up to at least ${least} ${code} in the smallest unit.`,
      },
      false,
    );
  }
  return { amount, currency: code };
}

const sessionFilters = listParameters.extend({
  payment_intent: z.string().optional(),
  status: z.enum(['open', 'complete', 'expired']).optional(),
});

function listSessions(desk: Desk, call: Call): object {
  const { payment_intent: intent, status, ...list } = readParameters(sessionFilters, call.input);
  expireDue(desk);
  const found = Object.values(desk.book.sessions).filter(
    (session) =>
      (intent === undefined || session.payment_intent === intent) &&
      (status === undefined || session.status === status),
  );
  return page('/v1/checkout/sessions', found, list);
}

function sessionOf(desk: Desk, id: string): Session {
  const session = onShelf(desk.book.sessions, id);
  if (!session) throw missing('checkout.session', id, 'session');
  return session;
}

function readSession(desk: Desk, call: Call): Session {
  readParameters(z.strictObject({ expand: formExpand }), call.input);
  expireDue(desk);
  return sessionOf(desk, call.path['id'] ?? '');
}

function expireOnRequest(desk: Desk, call: Call): Session {
  readParameters(z.strictObject({ expand: formExpand }), call.input);
  const session = sessionOf(desk, call.path['id'] ?? '');
  if (session.status !== 'open') {
    throw new ApiError(400, 'invalid_request_error', {
      message: `Only Checkout Sessions with a status in ["open"] can be expired. This Checkout Session has a status of ${session.status ?? 'unknown'}.`,
    });
  }
  return expireSession(desk, session, call);
}

function expireSession(desk: Desk, session: Session, cause: Call | null): Session {
  session.status = 'expired';
  session.url = null;
  desk.emit('checkout.session.expired', session, cause);
  return session;
}

/** Ends the sessions whose time is over, as the service does by itself. */
export function expireDue(desk: Desk): void {
  for (const session of Object.values(desk.book.sessions)) {
    if (session.status === 'open' && session.expires_at <= desk.now()) {
      expireSession(desk, session, null);
    }
  }
}
