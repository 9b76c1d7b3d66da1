import { randomBytes } from 'node:crypto';
import { doubleCsrf } from 'csrf-csrf';
import type { Request, Response } from 'express';
import type { AppSettings } from '../app-context';
import { cookieName, cookiesOf } from './cookies';

export interface Csrf {
  /** Sets the readable XSRF-TOKEN cookie, bound to the session or, before sign-in, to the visitor. */
  readonly giveToken: (request: Request, response: Response) => void;
  /** As `giveToken`, with a token that was never used: after sign-in and sign-out. */
  readonly renewToken: (request: Request, response: Response) => void;
  /** Whether the header holds the cookie's token and the token is this session's or visitor's. */
  readonly holds: (request: Request) => boolean;
  /** Whether the browser says that another site's page sent the request. */
  readonly isForeign: (request: Request) => boolean;
}

/** Signed double submit; a visitor is known by a cookie of its own, so that no session row is made for one. */
export function createCsrf(settings: AppSettings): Csrf {
  const { secureCookies: secure, csrfSecret, origin } = settings;
  const own = ownOrigins(origin);
  const visitorCookie = cookieName('visitor', secure);
  const visitors = new WeakMap<Request, string>();
  const { generateCsrfToken, validateRequest } = doubleCsrf({
    getSecret: () => csrfSecret,
    getSessionIdentifier: (request) =>
      request.actor ? `session:${request.sessionID}` : `visitor:${visitorOf(request)}`,
    getCsrfTokenFromRequest: (request) => request.get('x-xsrf-token'),
    cookieName: 'XSRF-TOKEN',
    cookieOptions: { httpOnly: false, sameSite: 'lax', path: '/', secure },
  });

  function visitorOf(request: Request): string {
    return visitors.get(request) ?? cookiesOf(request)[visitorCookie] ?? '';
  }

  function rememberVisitor(request: Request, response: Response): void {
    if (request.actor || visitorOf(request)) return;
    const visitor = randomBytes(32).toString('base64url');
    visitors.set(request, visitor);
    response.cookie(visitorCookie, visitor, { httpOnly: true, sameSite: 'lax', path: '/', secure });
  }

  function give(request: Request, response: Response, overwrite: boolean): void {
    rememberVisitor(request, response);
    request.cookies = cookiesOf(request);
    generateCsrfToken(request, response, { overwrite });
  }

  return {
    giveToken: (request, response) => give(request, response, false),
    renewToken: (request, response) => give(request, response, true),
    holds: (request) => {
      request.cookies = cookiesOf(request);
      return validateRequest(request);
    },
    isForeign: (request) => isForeign(request, own),
  };
}

/** Our own origin; on this machine alone, by either of its names. */
function ownOrigins(origin: string): ReadonlySet<string> {
  const { protocol, hostname, port } = new URL(origin);
  const names = ['127.0.0.1', 'localhost'];
  if (protocol !== 'http:' || !names.includes(hostname)) return new Set([origin]);
  return new Set(names.map((name) => `http://${name}${port && `:${port}`}`));
}

/** A browser states where a request comes from and pages cannot forge it; programs state nothing. */
function isForeign(request: Request, own: ReadonlySet<string>): boolean {
  const site = request.get('sec-fetch-site');
  if (site !== undefined && site !== 'same-origin' && site !== 'none') return true;
  const stated = request.get('origin');
  return stated !== undefined && !own.has(stated);
}
