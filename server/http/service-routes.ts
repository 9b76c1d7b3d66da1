import { sql } from 'drizzle-orm';
import * as z from 'zod';
import { staffRoles } from '@shared/contracts/accounts-contract';
import { ok } from './answers';
import { cookieName } from './cookies';
import { fail } from './failure';
import { openApiOf } from './openapi';
import { isUnavailable } from './problem';
import { route, type RouteDefinition } from './route';

const healthSchema = z.object({
  status: z.literal('ok'),
  database: z.literal('ok'),
  version: z.string(),
});

const health = route({
  method: 'get',
  path: '/api/health',
  summary: 'Whether the server and its database answer',
  access: 'public',
  audit: 'none',
  transaction: 'none',
  keepsSessionAlive: false,
  request: {},
  response: { 200: healthSchema },
  handler: async ({ context }) => {
    try {
      await context.database.execute(sql`select 1`);
    } catch (error) {
      if (!isUnavailable(error)) throw error;
      return fail('unavailable', { retryAfterSeconds: 5 });
    }
    return ok({ status: 'ok', database: 'ok', version: context.settings.version });
  },
});

/** What the service tells about itself; `listed` gives every mounted route, these among them. */
export function serviceRoutes(listed: () => readonly RouteDefinition[]): RouteDefinition[] {
  const openApi = route({
    method: 'get',
    path: '/api/openapi.json',
    summary: 'This description, as OpenAPI 3.1',
    access: { roles: staffRoles },
    audit: 'none',
    transaction: 'none',
    request: {},
    response: { 200: z.record(z.string(), z.unknown()) },
    handler: ({ context: { settings } }) => {
      const { origin, version } = settings;
      const sessionCookie = cookieName('sid', settings.secureCookies);
      const body = openApiOf(listed(), { origin, version, sessionCookie });
      return Promise.resolve(ok(body));
    },
  });
  return [health, openApi];
}
