import type { Request } from 'express';
import type { Csrf } from './csrf';
import { fail } from './failure';
import type { RouteDefinition } from './route';

const isUnsafe = (request: Request): boolean =>
  request.method !== 'GET' && request.method !== 'HEAD';

/**
 * Who may call the route, before anything of the request is read.
 * @throws Failure `csrf`, `unauthenticated` or `forbidden`
 */
export function authorize(route: RouteDefinition, request: Request, csrf: Csrf): void {
  const guarded = isUnsafe(request) && route.csrf !== 'exempt';
  if (guarded && csrf.isForeign(request)) throw fail('csrf');
  const { access } = route;
  if (access !== 'public' && !request.actor) throw fail('unauthenticated');
  if (guarded && !csrf.holds(request)) throw fail('csrf');
  if (typeof access === 'object' && !request.actor?.roles.some((r) => access.roles.includes(r))) {
    throw fail('forbidden');
  }
}
