import * as z from 'zod';
import {
  auditQuerySchema,
  auditResponseSchema,
  type AuditQuery,
} from '@shared/contracts/audit-contract';
import { toInstant } from '@shared/scheduling/wall-time';
import type { Transaction } from '../database/client';
import { ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { fail } from '../http/failure';
import { route } from '../http/route';
import { listSites } from '../settings/sites-queries';
import { type AuditSpan, type ListedEvent, listAuditEvents } from './audit-events-queries';

const cursorKeys = z.tuple([z.int().min(0)]);

const withoutSequence = ({ sequence: _order, ...event }: ListedEvent) => event;

/**
 * The instants of a span of days at a site.
 * @throws Failure `invalid-request` when there is no such site
 */
async function spanOf(tx: Transaction, { siteId, from, to }: AuditQuery): Promise<AuditSpan> {
  if (siteId === undefined) return { from: null, to: null };
  const site = (await listSites(tx)).find(({ id }) => id === siteId);
  if (!site) {
    const errors = [{ path: 'siteId', code: 'custom', message: 'There is no such site' }];
    throw fail('invalid-request', { errors });
  }
  const beginning = (localDate: string | undefined) =>
    localDate === undefined ? null : toInstant({ localDate, localTime: '00:00' }, site.timeZone);
  return { from: beginning(from), to: beginning(to) };
}

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
        ...(query.from && { from: query.from }),
        ...(query.to && { to: query.to }),
      }),
    },
    request: { query: auditQuerySchema },
    response: { 200: auditResponseSchema },
    handler: async ({ tx, input: { query } }) => {
      const { limit, cursor } = query;
      const before = cursor ? decodeCursor(cursorKeys, cursor)[0] : null;
      const span = await spanOf(tx, query);
      const rows = await listAuditEvents(tx.connection, query, { limit: limit + 1, before, span });
      const page = pageOf(rows, limit, ({ sequence }) => [sequence]);
      return ok({ ...page, items: page.items.map(withoutSequence) });
    },
  }),
];
