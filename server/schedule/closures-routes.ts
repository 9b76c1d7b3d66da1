import * as z from 'zod';
import {
  closedResponseSchema,
  closureRequestSchema,
  closuresQuerySchema,
  closuresResponseSchema,
} from '@shared/contracts/class-templates-contract';
import { created, noContent, ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import type { AppointmentListener } from './appointment-events';
import { closeSite, findClosureSite, listClosures, reopenSite } from './closures-service';
import { scheduleContext } from './schedule-context';
import { mayPlan, planningRoles } from './schedule-policy';

const list = route({
  method: 'get',
  path: '/api/closures',
  summary: 'The local dates on which a site holds no class',
  access: { roles: planningRoles },
  audit: 'none',
  request: { query: closuresQuerySchema },
  response: { 200: closuresResponseSchema },
  handler: async ({ actor, tx, input: { query } }) => {
    if (!mayPlan(actor, query.siteId)) return fail('not-found');
    return ok({ items: await listClosures(tx, query.siteId, query.from), nextCursor: null });
  },
});

const close = (listeners: readonly AppointmentListener[]) =>
  route({
    method: 'post',
    path: '/api/closures',
    summary: 'Closes a site for a day, cancels who is booked and tells them',
    access: { roles: planningRoles },
    audit: 'handler',
    transaction: 'none',
    request: { body: closureRequestSchema },
    response: { 201: closedResponseSchema },
    handler: async (call) => {
      const { actor, context, input } = call;
      if (!mayPlan(actor, input.body.siteId)) return fail('not-found');
      const closed = await closeSite(
        context.database,
        scheduleContext(call, listeners),
        input.body,
      );
      if (closed instanceof Failure) return closed;
      call.audit({
        action: 'site.closed',
        objectType: 'closure',
        objectId: closed.closure.id,
        details: { localDate: closed.closure.localDate, cancelled: closed.cancelled },
      });
      return created(closed);
    },
  });

const reopen = route({
  method: 'delete',
  path: '/api/closures/:id',
  summary: 'Takes a closure back; who was cancelled stays so until booked anew',
  access: { roles: planningRoles },
  audit: 'handler',
  transaction: 'none',
  request: { params: z.object({ id: z.uuid() }) },
  response: { 204: null },
  handler: async ({ actor, context, input, audit }) => {
    const { id } = input.params;
    const siteId = await findClosureSite(context.database, id);
    if (siteId === null || !mayPlan(actor, siteId)) return fail('not-found');
    await reopenSite(context.database, context.clock.now(), id);
    audit({ action: 'site.reopened', objectType: 'closure', objectId: id });
    return noContent();
  },
});

export const closuresRoutes = (listeners: readonly AppointmentListener[]): RouteDefinition[] => [
  list,
  close(listeners),
  reopen,
];
