import {
  sessionResponseSchema,
  type SessionResponse,
  type SessionUser,
} from '@shared/contracts/accounts-contract';
import type { AppContext } from '../app-context';
import { ok } from '../http/answers';
import { createCsrf } from '../http/csrf';
import { route, type RouteDefinition } from '../http/route';
import type { Actor } from './actor';

/** The account as its own person sees it. */
export const toSessionUser = ({
  id,
  displayName,
  email,
  roles,
  patientId,
}: Actor): SessionUser => ({
  id,
  displayName,
  email,
  roles: [...roles],
  patientId,
});

export function accountsRoutes({ settings }: AppContext): RouteDefinition[] {
  const csrf = createCsrf(settings);
  const session = route({
    method: 'get',
    path: '/api/auth/session',
    summary: 'Who is signed in; sets the XSRF-TOKEN cookie that every write sends back',
    access: 'public',
    audit: 'none',
    transaction: 'none',
    request: {},
    response: { 200: sessionResponseSchema },
    handler: ({ actor, http }) => {
      csrf.giveToken(http.request, http.response);
      const body: SessionResponse = {
        user: actor && toSessionUser(actor),
        demo: settings.demo,
        demoAccounts: [...settings.demoAccounts],
      };
      return Promise.resolve(ok(body));
    },
  });
  return [session];
}
