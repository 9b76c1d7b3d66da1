import { randomBytes } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import express, { Router, type RequestHandler, type Response } from 'express';
import { API_POLICY, pagePolicy } from './security-headers';

const NONCE_PLACEHOLDER = '__CSP_NONCE__';
/** What `ng build` names by content: main-ABCD1234.js, chunk-xpl-0SmD.js */
const HASHED = /-[\w-]{8}\.(js|css|woff2)$/;
const PRIVATE = /\.map$/;

const noStore = (response: Response): void => void response.set('Cache-Control', 'no-store');

/** A person opening an address of the client, as opposed to a page fetching a file; anyone may ask for the first page. */
const isNavigation = (path: string, accept: string): boolean =>
  path === '/' ||
  (accept.includes('text/html') && !path.split('/').some((segment) => segment.includes('.')));

/** The page with a nonce of this reply's own, in the header and in the page alike. */
function sendPage(page: string): RequestHandler {
  return (request, response, next) => {
    const isRead = request.method === 'GET' || request.method === 'HEAD';
    if (!isRead || !isNavigation(request.path, request.get('accept') ?? '')) return next();
    const nonce = randomBytes(16).toString('base64');
    noStore(response);
    response.set('Content-Security-Policy', pagePolicy(nonce));
    response.type('html').send(page.replaceAll(NONCE_PLACEHOLDER, nonce));
  };
}

function setFileHeaders(response: Response, path: string): void {
  // A picture or a script may be opened as a page of its own: then nothing runs in it.
  response.set('Content-Security-Policy', API_POLICY);
  response.set(
    'Cache-Control',
    HASHED.test(path) ? 'public, max-age=31536000, immutable' : 'no-cache',
  );
}

/**
 * The built client: its files, and its page for every address that is none.
 * @param folder where index.html is
 * @throws when the client is not built
 */
export function clientFiles(folder: string): Router {
  const page = readFileSync(join(folder, 'index.html'), 'utf8');
  const files = express.static(folder, {
    index: false,
    redirect: false,
    dotfiles: 'ignore',
    cacheControl: false,
    setHeaders: setFileHeaders,
  });
  const router = Router();
  router.use((request, response, next) => {
    if (PRIVATE.test(request.path) || request.path === '/index.html') next('router');
    else files(request, response, next);
  });
  router.use(sendPage(page));
  return router;
}
