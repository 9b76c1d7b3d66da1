import type { RequestHandler } from 'express';
import helmet from 'helmet';
import type { AppSettings } from '../app-context';

const YEAR_SECONDS = 365 * 24 * 60 * 60;

const policy = (...directives: readonly string[]): string => directives.join('; ');

/** Of an answer that no browser should run as a page. */
export const API_POLICY = policy("default-src 'none'", "frame-ancestors 'none'");

/**
 * Of the client's page. Scripts are its own files; styles too, and those that Angular and the calendar put in with the
 * nonce; the calendar's icons are a font inside its style.
 */
export const pagePolicy = (nonce: string): string =>
  policy(
    "default-src 'self'",
    "script-src 'self'",
    `style-src 'self' 'nonce-${nonce}'`,
    "img-src 'self' data:",
    "font-src 'self' data:",
    "connect-src 'self'",
    "worker-src 'self'",
    "manifest-src 'self'",
    "object-src 'none'",
    "base-uri 'self'",
    "form-action 'self'",
    "frame-ancestors 'none'",
  );

/** On every reply; the page puts its own content policy in the place of the one for the API. */
export function securityHeaders({ secureCookies }: AppSettings): RequestHandler {
  const common = helmet({
    contentSecurityPolicy: false,
    strictTransportSecurity: secureCookies && { maxAge: YEAR_SECONDS, includeSubDomains: true },
    referrerPolicy: { policy: 'no-referrer' },
    frameguard: { action: 'deny' },
  });
  return (request, response, next) => {
    response.set('Content-Security-Policy', API_POLICY);
    common(request, response, next);
  };
}
