import request, { type Test } from 'supertest';
import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { noContent } from '../../server/http/answers';
import { route } from '../../server/http/route';
import { agentFor, visitor, type Agent } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

/** Every method that changes something, and the one door that a program without a session knocks at. */
const done: string[] = [];
const base = {
  summary: 'For a spec',
  audit: 'none',
  transaction: 'none',
  response: { 204: null },
} as const;
const marks = (name: string) => () => {
  done.push(name);
  return Promise.resolve(noContent());
};
const routes = [
  ...(['post', 'put', 'patch', 'delete'] as const).map((method) =>
    route({
      ...base,
      method,
      path: '/api/marks',
      access: 'signed-in',
      request: {},
      handler: marks(method),
    }),
  ),
  route({
    ...base,
    method: 'post',
    path: '/api/hook',
    access: 'public',
    csrf: 'exempt',
    request: { body: 'raw' },
    bodyLimit: 1000,
    handler: ({ input }) => {
      done.push(`hook ${input.body.toString()}`);
      return Promise.resolve(noContent());
    },
  }),
  route({
    ...base,
    method: 'post',
    path: '/api/open',
    access: 'public',
    request: { body: z.strictObject({ a: z.string() }) },
    handler: marks('open'),
  }),
];

describe('writes that another site could send', () => {
  let house: TestApp;
  let agent: Agent;
  let other: Agent;

  beforeAll(async () => {
    house = await createTestApp({ extraRoutes: routes });
    agent = await agentFor(house, await buildUser(house.context.database));
    other = await agentFor(house, await buildUser(house.context.database));
  });
  afterAll(() => house.close());

  const forgeries: [string, (test: Test) => Test][] = [
    ['without the token', (test) => test.unset('X-XSRF-TOKEN')],
    ['with an empty token', (test) => test.set('X-XSRF-TOKEN', '')],
    [
      'with a made-up token',
      (test) => test.set('X-XSRF-TOKEN', `${'a'.repeat(64)}.${'b'.repeat(64)}`),
    ],
    [
      'with another session’s token',
      (test) => test.set('X-XSRF-TOKEN', other.cookies['XSRF-TOKEN'] ?? ''),
    ],
    [
      'with another session’s token in the cookie too',
      (test) => {
        const token = other.cookies['XSRF-TOKEN'] ?? '';
        const cookie = `sid=${encodeURIComponent(agent.cookies['sid'] ?? '')}; XSRF-TOKEN=${token}`;
        return test.set('X-XSRF-TOKEN', token).set('Cookie', cookie);
      },
    ],
    ['from another origin', (test) => test.set('Origin', 'https://evil.example')],
    ['from an origin that hides', (test) => test.set('Origin', 'null')],
    ['from the same host on another port', (test) => test.set('Origin', 'http://127.0.0.1:3001')],
    ['as the browser says, from another site', (test) => test.set('Sec-Fetch-Site', 'cross-site')],
    ['as the browser says, from a sibling host', (test) => test.set('Sec-Fetch-Site', 'same-site')],
  ];
  const methods = ['post', 'put', 'patch', 'delete'] as const;

  it.each(
    forgeries.flatMap(([name, forge]) => methods.map((method) => [method, name, forge] as const)),
  )('are refused: %s %s', async (method, _name, forge) => {
    done.length = 0;
    const reply = await forge(agent[method]('/api/marks')).expect(403);
    expect(reply.body.code).toBe('csrf');
    expect(done).toEqual([]);
  });

  it.each(['text/plain', 'application/x-www-form-urlencoded', 'multipart/form-data; boundary=x'])(
    'are refused as %s, which needs no leave to be sent',
    async (type) => {
      done.length = 0;
      await agent.post('/api/open').set('Content-Type', type).send('{"a":"b"}').expect(415);
      await agent.post('/api/marks').set('Content-Type', type).send('{"a":"b"}').expect(415);
      expect(done).toEqual([]);
    },
  );

  it('pass with the session’s own token, from our own pages and from programs', async () => {
    done.length = 0;
    for (const method of methods) await agent[method]('/api/marks').expect(204);
    const origin = house.context.settings.origin;
    await agent
      .post('/api/marks')
      .set('Origin', origin)
      .set('Sec-Fetch-Site', 'same-origin')
      .expect(204);
    await agent
      .post('/api/marks')
      .set('Origin', origin.replace('127.0.0.1', 'localhost'))
      .expect(204);
    expect(done).toEqual([...methods, 'post', 'post']);
  });

  it('need a token before sign-in too, of the visitor’s own', async () => {
    const [one, two] = [await visitor(house), await visitor(house)];
    await one.post('/api/open').send({ a: 'b' }).expect(204);
    const foreign = two.cookies['XSRF-TOKEN'] ?? '';
    await one.post('/api/open').send({ a: 'b' }).set('X-XSRF-TOKEN', foreign).expect(403);
    const body = { email: 'a@clinic.example', password: 'x' };
    await one.post('/api/auth/sign-in').send(body).unset('X-XSRF-TOKEN').expect(403);
    await one.post('/api/auth/sign-out').unset('X-XSRF-TOKEN').expect(403);
    await one
      .post('/api/auth/forgotten-password')
      .send({ email: body.email })
      .unset('X-XSRF-TOKEN')
      .expect(403);
    await request(house.app).post('/api/open').send({ a: 'b' }).expect(403);
  });

  it('make no session for a visitor', async () => {
    await visitor(house);
    const { rows } = await house.context.database.$client.query(
      'SELECT count(*)::int AS count FROM sessions WHERE user_id IS NULL',
    );
    expect(rows).toEqual([{ count: 0 }]);
  });

  it('may skip the token only where the route says so, and arrive there as they were sent', async () => {
    done.length = 0;
    const send = (body: string) =>
      request(house.app).post('/api/hook').set('Content-Type', 'application/json').send(body);
    await send('{ "b" : 1,  "a":2 }').expect(204);
    expect(done).toEqual(['hook { "b" : 1,  "a":2 }']);
    await send('x'.repeat(1001)).expect(413);
  });

  it('leave a record when they are refused', async () => {
    await agent.post('/api/marks').unset('X-XSRF-TOKEN').expect(403);
    const { rows } = await house.context.database.$client.query(
      `SELECT action, object_id, outcome, details->>'code' AS code, actor_id IS NOT NULL AS known
         FROM audit_events ORDER BY sequence DESC LIMIT 1`,
    );
    expect(rows).toEqual([
      {
        action: 'access.refused',
        object_id: 'POST /api/marks',
        outcome: 'refused',
        code: 'csrf',
        known: true,
      },
    ]);
  });

  it('answer reads from anywhere, without leave to read the answer', async () => {
    const reply = await agent.get('/api/sites').set('Origin', 'https://evil.example').expect(200);
    expect(reply.headers).not.toHaveProperty('access-control-allow-origin');
    expect(reply.headers).not.toHaveProperty('access-control-allow-credentials');
  });
});
