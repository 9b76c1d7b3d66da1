import { randomBytes } from 'node:crypto';
import type { Request, RequestHandler } from 'express';
import session from 'express-session';
import type { AppContext } from '../app-context';
import { cookieName } from './cookies';
import { SessionStore } from './session-store';

/** Loads the session that the cookie names and, with it, `request.actor`. A visitor makes no row. */
export function sessionMiddleware({ database, clock, settings }: AppContext): RequestHandler {
  const load = session({
    name: cookieName('sid', settings.secureCookies),
    secret: settings.sessionSecret,
    store: new SessionStore(database.$client, clock),
    genid: () => randomBytes(32).toString('base64url'),
    resave: false,
    saveUninitialized: false,
    cookie: { httpOnly: true, sameSite: 'lax', path: '/', secure: settings.secureCookies },
  });
  if (!settings.secureCookies) return load;
  return (request, response, next) => {
    // TLS ends before this process: the origin that people type tells it, not this connection.
    Object.defineProperty(request, 'secure', { value: true });
    load(request, response, next);
  };
}

const settled = (act: (done: (error?: Error | null) => void) => void): Promise<void> =>
  new Promise((resolve, reject) => {
    act((error) => (error ? reject(error) : resolve()));
  });

/** Ends the present session, if any, and prepares one with a new id: no id from before sign-in lives on. */
export const renewSession = (request: Request): Promise<void> =>
  settled((done) => request.session.regenerate(done));

/** Ends the present session; its cookie opens nothing from now on. */
export const endSession = (request: Request): Promise<void> =>
  settled((done) => request.session.destroy(done));
