import { createHmac, randomBytes } from 'node:crypto';
import request, { type Test } from 'supertest';
import { sessionHash } from '../../server/http/session-store';
import type { TestApp } from './test-app';

/** A browser of its own: its cookies, and the token that they call for. */
export interface Agent {
  readonly get: (path: string) => Test;
  readonly post: (path: string) => Test;
  readonly put: (path: string) => Test;
  readonly patch: (path: string) => Test;
  readonly delete: (path: string) => Test;
  readonly cookies: Readonly<Record<string, string>>;
}

/** express-session's own form: `s:` id, dot, HMAC. */
function signed(sid: string, secret: string): string {
  const signature = createHmac('sha256', secret).update(sid).digest('base64').replace(/=+$/, '');
  return `s:${sid}.${signature}`;
}

async function openSession({ context, clock }: TestApp, userId: string): Promise<string> {
  const sid = randomBytes(32).toString('base64url');
  const now = clock.now();
  await context.database.$client.query(
    `INSERT INTO sessions (sid, sess, expire, user_id, created_at) VALUES ($1, '{"cookie":{}}', $2, $3, $4)`,
    [sessionHash(sid), new Date(now.getTime() + 15 * 60_000), userId, now],
  );
  return signed(sid, context.settings.sessionSecret);
}

/** The cookies of a reply, by name; an emptied one is gone. */
export function keepCookies(jar: Record<string, string>, reply: { headers: unknown }): void {
  const headers = reply.headers as Record<string, string[] | undefined>;
  for (const line of headers['set-cookie'] ?? []) {
    const [pair = ''] = line.split(';');
    const cut = pair.indexOf('=');
    jar[pair.slice(0, cut)] = decodeURIComponent(pair.slice(cut + 1));
  }
}

const cookieHeader = (jar: Record<string, string>): string =>
  Object.entries(jar)
    .map(([name, value]) => `${name}=${encodeURIComponent(value)}`)
    .join('; ');

async function agentWith({ app }: TestApp, jar: Record<string, string>): Promise<Agent> {
  const calling =
    (method: 'get' | 'post' | 'put' | 'patch' | 'delete') =>
    (path: string): Test => {
      const test = request(app)[method](path).set('Cookie', cookieHeader(jar));
      if (method !== 'get') test.set('X-XSRF-TOKEN', jar['XSRF-TOKEN'] ?? '');
      test.on('response', (reply: { headers: unknown }) => keepCookies(jar, reply));
      return test;
    };
  const agent: Agent = {
    get: calling('get'),
    post: calling('post'),
    put: calling('put'),
    patch: calling('patch'),
    delete: calling('delete'),
    cookies: jar,
  };
  await agent.get('/api/auth/session').expect(200);
  return agent;
}

/** Someone who is not signed in. */
export const visitor = (testApp: TestApp): Promise<Agent> => agentWith(testApp, {});

/** Someone who is signed in already, without the cost of a password. */
export async function agentFor(testApp: TestApp, user: { readonly id: string }): Promise<Agent> {
  return agentWith(testApp, { sid: await openSession(testApp, user.id) });
}
