import compression from 'compression';
import express, {
  type ErrorRequestHandler,
  type Express,
  type RequestHandler,
  type Response,
} from 'express';
import type { AppContext } from './app-context';
import { featureRoutes } from './features';
import { clientFiles } from './http/client-files';
import { createCsrf } from './http/csrf';
import { fail } from './http/failure';
import { requestLog } from './http/log';
import { mountRoutes } from './http/mount-routes';
import { sendProblem, toFailure } from './http/problem';
import { securityHeaders } from './http/security-headers';
import { sessionMiddleware } from './http/session';
import type { RouteDefinition } from './http/route';

const isEventStream = (response: Response): boolean =>
  String(response.getHeader('Content-Type')).startsWith('text/event-stream');

/** What goes wrong outside a route: a session that cannot be read, a path that cannot be decoded. */
const lastResort: ErrorRequestHandler = (error: unknown, request, response, _next) => {
  const failure = toFailure(error);
  if (failure.code === 'internal' || failure.code === 'unavailable') {
    request.log.error({ err: error }, 'a call failed');
  }
  if (response.headersSent) response.destroy();
  else sendProblem(response, failure);
};

/** The whole server as one Express application; it holds no state but its connections. */
export function createApp(
  context: AppContext,
  routes: readonly RouteDefinition[] = featureRoutes(context),
): Express {
  const { settings, log } = context;
  const app = express();
  app.set('trust proxy', settings.trustProxyHops);
  app.set('etag', false);
  app.disable('x-powered-by');
  app.use(requestLog(log));
  app.use(securityHeaders(settings));
  app.use((request, response, next) => {
    if (request.method !== 'TRACE') return next();
    sendProblem(response, fail('method-not-allowed'));
  });
  app.use(
    compression({
      filter: (request, response) =>
        !isEventStream(response) && compression.filter(request, response),
    }),
  );
  app.use('/api', (_request, response, next) => {
    response.set('Cache-Control', 'no-store');
    next();
  });
  app.use('/api', sessionMiddleware(context));
  app.use(mountRoutes(routes, context, createCsrf(settings)));
  const notFound: RequestHandler = (_request, response) => sendProblem(response, fail('not-found'));
  app.use('/api', notFound);
  if (settings.clientFolder) app.use(clientFiles(settings.clientFolder));
  app.use(notFound);
  app.use(lastResort);
  return app;
}
