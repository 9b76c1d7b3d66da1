import type { RequestHandler } from 'express';

const loopbackHost = /^(127\.0\.0\.1|localhost|\[::1\])(:\d+)?$/i;

/**
 * For the stand-ins' own controls: answers only calls made to a loopback name and not sent by
 * another site's page, so that a page open in the same browser cannot reset or read a stand-in.
 */
export const localOnly: RequestHandler = (request, response, next) => {
  const site = request.get('sec-fetch-site') ?? 'none';
  if (loopbackHost.test(request.get('host') ?? '') && ['none', 'same-origin'].includes(site)) {
    next();
    return;
  }
  response.status(403).json({ message: 'The controls of a stand-in answer to this machine only.' });
};
