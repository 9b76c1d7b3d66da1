import type { Role } from '@shared/contracts/accounts-contract';
import { timePosition } from '@shared/contracts/fields';
import {
  undeliveredRequestSchema,
  undeliveredResponseSchema,
} from '@shared/contracts/messages-contract';
import { ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { route, type RouteDefinition } from '../http/route';
import { listUndelivered } from './undelivered-queries';

/** Who calls a patient whom no message reaches. */
const deskRoles: readonly Role[] = ['front-desk', 'director'];

const undelivered = route({
  method: 'post',
  path: '/api/messages/undelivered',
  summary: 'Messages to patients of one’s sites that reached nobody, newest first',
  access: { roles: deskRoles },
  audit: {
    action: 'messages.undelivered-listed',
    objectType: 'message',
    patientId: ({ result }) => [...new Set(result.body.items.map(({ patientId }) => patientId))],
  },
  request: { body: undeliveredRequestSchema },
  response: { 200: undeliveredResponseSchema },
  handler: async ({ tx, actor, input: { body } }) => {
    const { cursor, limit } = body;
    const after = cursor ? decodeCursor(timePosition, cursor) : undefined;
    const found = await listUndelivered(tx, actor, { after, limit });
    return ok(pageOf(found, limit, ({ dueAt, id }) => [dueAt, id]));
  },
});

export const messagesRoutes: RouteDefinition[] = [undelivered];
