import { Router, type Request, type RequestHandler, type Response } from 'express';
import type { AppContext } from '../app-context';
import { recordAuditAlone, type AuditEntry } from '../audit/audit-service';
import type { Csrf } from './csrf';
import { dispatch, failureOf, type Dispatch } from './dispatch';
import { fail, type Failure } from './failure';
import { callId, isUnavailable, sendProblem } from './problem';
import { bodyReaderOf } from './request-input';
import { sourceOf } from './request-origin';
import { checkRoute, type AnyAnswer, type RouteDefinition } from './route';

declare module 'express-serve-static-core' {
  interface Request {
    /** The route's template, for the log: an address as it was called may hold ids and tokens. */
    routeTemplate?: string;
  }
}

/** Fixed segments before parameters, so that no order of declaration hides a route. */
function bySpecificity(a: RouteDefinition, b: RouteDefinition): number {
  const weight = (path: string): string => path.replaceAll(/:\w+/g, '\uffff');
  return weight(a.path) < weight(b.path) ? -1 : 1;
}

/** @throws when two routes take the same calls, or one states no access */
export function mountRoutes(
  routes: readonly RouteDefinition[],
  context: AppContext,
  csrf: Csrf,
): Router {
  const router = Router();
  refuseTwins(routes);
  const sorted = [...routes].sort(bySpecificity);
  for (const route of sorted) {
    checkRoute(route);
    router[route.method](
      route.path,
      handlerOf({ route, context, csrf, readBody: bodyReaderOf(route) }),
    );
  }
  for (const path of new Set(sorted.map((route) => route.path))) {
    router.all(path, refuseMethod(sorted.filter((route) => route.path === path)));
  }
  return router;
}

function refuseTwins(routes: readonly RouteDefinition[]): void {
  const names = routes.map(({ method, path }) => `${method} ${path.replaceAll(/:\w+/g, ':')}`);
  const twin = names.find((name, index) => names.indexOf(name) !== index);
  if (twin) throw new Error(`Two routes take ${twin}`);
}

const refuseMethod =
  (routes: readonly RouteDefinition[]): RequestHandler =>
  (request, response) => {
    request.routeTemplate = routes[0]?.path ?? '';
    response.set('Allow', routes.map(({ method }) => method.toUpperCase()).join(', '));
    sendProblem(response, fail('method-not-allowed'));
  };

function handlerOf(dispatched: Dispatch): RequestHandler {
  const { route } = dispatched;
  return async (request, response) => {
    request.routeTemplate = route.path;
    try {
      send(route, response, await dispatch(dispatched, request, response));
    } catch (error) {
      await refuse(dispatched, request, response, error);
    }
  };
}

function send(route: RouteDefinition, response: Response, answer: AnyAnswer): void {
  const kind = route.response[answer.status];
  response.status(answer.status).set(answer.headers ?? {});
  if (kind && 'stream' in kind) {
    response.type(kind.stream).flushHeaders();
    (answer.body as (response: Response) => void)(response);
  } else if (kind && 'text' in kind) {
    response.type(kind.text).send(answer.body);
  } else if (kind && 'file' in kind) {
    response.type(kind.file).send(answer.body);
  } else if (answer.body === undefined || answer.body === null) {
    response.end();
  } else {
    response.json(answer.body);
  }
}

/** Nothing is swallowed: the unexpected is logged under the id that the caller is given. */
async function refuse(
  { route, context }: Dispatch,
  request: Request,
  response: Response,
  error: unknown,
): Promise<void> {
  const failure = failureOf(route, error);
  if (failure.code === 'internal' || isUnavailable(error)) {
    request.log.error({ err: error, route: route.path }, 'a call failed');
  }
  const record = failure.details.record ?? refusalOf(route, failure, callId(request));
  if (record) await recordAuditAlone(context.database, sourceOf(request, context.clock), [record]);
  if (response.headersSent) response.destroy();
  else sendProblem(response, failure);
}

function refusalOf(route: RouteDefinition, { code }: Failure, call: string): AuditEntry | null {
  if (code !== 'csrf' && code !== 'forbidden') return null;
  return {
    action: 'access.refused',
    objectType: 'route',
    objectId: `${route.method.toUpperCase()} ${route.path}`,
    outcome: 'refused',
    details: { code, call },
  };
}
