import type { Request } from 'express';

/** Names by whether cookies travel over TLS alone: the `__Host-` prefix keeps other hosts from planting one. */
export const cookieName = (name: string, secure: boolean): string =>
  secure ? `__Host-${name}` : name;

/** The cookies that the request carries, read as browsers write them; the first of a name counts. */
export function cookiesOf(request: Request): Record<string, string> {
  const cookies = Object.create(null) as Record<string, string>;
  for (const pair of (request.headers.cookie ?? '').split(';')) {
    const cut = pair.indexOf('=');
    if (cut < 1) continue;
    const name = pair.slice(0, cut).trim();
    cookies[name] ??= decoded(pair.slice(cut + 1).trim());
  }
  return cookies;
}

function decoded(value: string): string {
  try {
    return decodeURIComponent(value);
  } catch {
    return value;
  }
}
