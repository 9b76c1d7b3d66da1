import * as z from 'zod';
import {
  chargeHistorySchema,
  chargeSchema,
  chargesQuerySchema,
  chargesResponseSchema,
  checkoutRequestSchema,
  checkoutResponseSchema,
  staffChargesRequestSchema,
  staffChargesResponseSchema,
  webhookHeadersSchema,
  webhookResponseSchema,
} from '@shared/contracts/billing-contract';
import { timePosition } from '@shared/contracts/fields';
import { requirePatientAccess } from '../accounts/access-service';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import { ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { billingRoles, checkoutRoles } from './billing-policy';
import { chargesOf, findCharge, findStaffCharge, staffCharges } from './billing-queries';
import { paymentsOf } from './charge-history-queries';
import { checkOut } from './checkout-service';
import { takeEvent } from './webhook-service';

const idParams = z.object({ id: z.uuid() });

/** @throws Failure `not-found` when there is no such charge, or it is not theirs */
async function openCharge(tx: Transaction, actor: Actor, id: string) {
  const charge = await findCharge(tx, id);
  if (!charge) throw fail('not-found');
  await requirePatientAccess(tx, actor, charge.patientId);
  return charge;
}

const list = route({
  method: 'get',
  path: '/api/charges',
  summary: 'A patient’s charges, newest first; one’s own without patientId',
  access: { roles: [...billingRoles, 'patient'] },
  audit: {
    action: 'charges.read',
    objectType: 'patient',
    objectId: ({ input, actor }) => input.query.patientId ?? actor?.patientId ?? null,
    patientId: ({ input, actor }) => input.query.patientId ?? actor?.patientId ?? null,
  },
  request: { query: chargesQuerySchema },
  response: { 200: chargesResponseSchema },
  handler: async ({ tx, actor, input: { query } }) => {
    const patientId = query.patientId ?? actor.patientId;
    if (patientId === null) return ok({ items: [] });
    await requirePatientAccess(tx, actor, patientId);
    return ok({ items: await chargesOf(tx, patientId) });
  },
});

const read = route({
  method: 'get',
  path: '/api/charges/:id',
  summary: 'One charge, as to tell whether a payment came through',
  access: { roles: [...billingRoles, 'patient'] },
  audit: {
    action: 'charge.read',
    objectType: 'charge',
    objectId: ({ input }) => input.params.id,
    patientId: ({ result }) => result.body.patientId,
  },
  request: { params: idParams },
  response: { 200: chargeSchema },
  handler: async ({ tx, actor, input }) => ok(await openCharge(tx, actor, input.params.id)),
});

const checkout = route({
  method: 'post',
  path: '/api/charges/:id/checkout',
  summary: 'Leads to the payment service’s page for a charge',
  access: { roles: [...checkoutRoles, 'patient'] },
  audit: 'handler',
  transaction: 'none',
  request: { params: idParams, body: checkoutRequestSchema },
  response: { 200: checkoutResponseSchema },
  handler: async ({ actor, context, input, audit }) => {
    const { id } = input.params;
    const { patientId } = await inTransaction(context.database, (tx) => openCharge(tx, actor, id));
    const url = await checkOut(context, actor, id, input.body);
    if (url instanceof Failure) return url;
    audit({ action: 'charge.checkout', objectType: 'charge', objectId: id, patientId });
    return ok({ url });
  },
});

const webhook = route({
  method: 'post',
  path: '/api/payments/webhook',
  summary: 'What the payment service tells, signed by it',
  access: 'public',
  csrf: 'exempt',
  audit: 'handler',
  bodyLimit: 256 * 1024,
  request: { headers: webhookHeadersSchema, body: 'raw' },
  response: { 200: webhookResponseSchema },
  handler: async ({ tx, context, input, log }) => {
    if (!context.payments) return fail('unavailable', { retryAfterSeconds: 60 });
    const signature = input.headers['stripe-signature'];
    const event = context.payments.readWebhook(input.body, signature);
    if (event.outcome === 'rejected') {
      log.warn({ detail: event.detail }, 'webhook rejected');
      return fail('unreadable-body', { title: 'The signature does not hold.' });
    }
    await takeEvent(tx, event, context.clock.now());
    return ok({ received: true });
  },
});

const staffList = route({
  method: 'post',
  path: '/api/billing/charges',
  summary: 'The charges of one’s sites, newest first',
  access: { roles: billingRoles },
  audit: {
    action: 'charges.listed',
    objectType: 'charge',
    patientId: ({ result }) => [...new Set(result.body.items.map(({ patientId }) => patientId))],
  },
  request: { body: staffChargesRequestSchema },
  response: { 200: staffChargesResponseSchema },
  handler: async ({ tx, actor, input: { body } }) => {
    const { cursor, ...filter } = body;
    const after = cursor ? decodeCursor(timePosition, cursor) : undefined;
    const found = await staffCharges(tx, actor, { ...filter, after });
    return ok(pageOf(found, body.limit, ({ createdAt, id }) => [createdAt, id]));
  },
});

const history = route({
  method: 'get',
  path: '/api/billing/charges/:id',
  summary: 'One charge with every attempt to pay it and what went back, by whom and when',
  access: { roles: billingRoles },
  audit: {
    action: 'charge.read',
    objectType: 'charge',
    objectId: ({ input }) => input.params.id,
    patientId: ({ result }) => result.body.charge.patientId,
  },
  request: { params: idParams },
  response: { 200: chargeHistorySchema },
  handler: async ({ tx, actor, input }) => {
    const charge = await findStaffCharge(tx, input.params.id);
    if (!charge) return fail('not-found');
    await requirePatientAccess(tx, actor, charge.patientId);
    return ok({ charge, payments: await paymentsOf(tx, charge.id) });
  },
});

export const billingRoutes: RouteDefinition[] = [list, read, checkout, webhook, staffList, history];
