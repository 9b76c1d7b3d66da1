import express, { type Router } from 'express';
import * as z from 'zod';
import { localOnly } from '../local-only';
import { expireDue } from './checkout-sessions';
import type { Desk } from './desk';
import { faultRule } from './faults';
import { deliverByHand, deliveryRules, handDelivery } from './webhooks';

const control = z.strictObject({
  /** Faults for the next calls to the API. */
  faults: z.array(faultRule).max(100).optional(),
  /** Standing rules of delivery. */
  webhooks: deliveryRules.optional(),
  /** An event of any type and content, as the service might send one. */
  emit: z
    .strictObject({ type: z.string().min(1), object: z.record(z.string(), z.unknown()) })
    .optional(),
  /** Ends an open session as if its time were over. */
  expire: z.string().optional(),
  /** Sends events now and answers how each was received. */
  deliver: handDelivery.optional(),
});

/** The stand-in's own controls, which the real service does not have. */
export function controlRoutes(desk: Desk, router: Router): void {
  router.get('/_health', localOnly, (_request, response) => {
    response.json({ status: 'ok' });
  });
  router.get('/_state', localOnly, (_request, response) => {
    response.json(desk.book);
  });
  router.post('/_reset', localOnly, async (_request, response) => {
    await desk.reset();
    response.status(204).end();
  });
  router.post('/_control', localOnly, express.json(), async (request, response) => {
    const asked = control.safeParse(request.body);
    if (!asked.success) {
      response.status(422).json({ message: z.prettifyError(asked.error) });
      return;
    }
    const { faults, webhooks, emit, expire, deliver } = asked.data;
    if (faults) desk.faults.add(faults);
    if (webhooks) desk.webhooks.setRules(webhooks);
    const event = emit ? desk.emit(emit.type, emit.object, null) : null;
    if (expire !== undefined) endSession(desk, expire);
    const deliveries = deliver ? await deliverByHand(deliver, desk.book, desk.webhooks) : [];
    await desk.save();
    response.json({ eventId: event?.id ?? null, deliveries });
  });
}

function endSession(desk: Desk, id: string): void {
  const session = desk.book.sessions[id];
  if (session?.status === 'open') session.expires_at = desk.now();
  expireDue(desk);
}
