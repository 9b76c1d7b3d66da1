import * as z from 'zod';
import { auditQuerySchema, auditResponseSchema } from '@shared/contracts/audit-contract';
import { ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { route } from '../http/route';
import { type ListedEvent, listAuditEvents } from './audit-events-queries';

const cursorKeys = z.tuple([z.int().min(0)]);

const withoutSequence = ({ sequence: _order, ...event }: ListedEvent) => event;

export const auditRoutes = [
  route({
    method: 'get',
    path: '/api/audit',
    summary: 'Who did what to which record, the newest first',
    access: { roles: ['administrator'] },
    audit: {
      action: 'audit.read',
      objectType: 'audit',
      patientId: ({ input }) => input.query.patientId ?? null,
      details: ({ input: { query } }) => ({
        ...(query.actorId && { actorId: query.actorId }),
        ...(query.action && { action: query.action }),
      }),
    },
    request: { query: auditQuerySchema },
    response: { 200: auditResponseSchema },
    handler: async ({ tx, input: { query } }) => {
      const { limit, cursor } = query;
      const before = cursor ? decodeCursor(cursorKeys, cursor)[0] : null;
      const rows = await listAuditEvents(tx.connection, query, { limit: limit + 1, before });
      const page = pageOf(rows, limit, ({ sequence }) => [sequence]);
      return ok({ ...page, items: page.items.map(withoutSequence) });
    },
  }),
];
