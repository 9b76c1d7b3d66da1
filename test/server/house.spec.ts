import { randomUUID } from 'node:crypto';
import type { Response } from 'express';
import request from 'supertest';
import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { fail } from '../../server/http/failure';
import { created, noContent, ok } from '../../server/http/answers';
import { eventStream, route, textAnswer, type RouteDefinition } from '../../server/http/route';
import { createApp } from '../../server/app';
import { suppressions } from '../../server/database/schema';
import { agentFor, visitor, type Agent } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

const anything = {
  audit: 'none',
  transaction: 'none',
  access: 'signed-in',
  summary: 'For a spec',
} as const;

const routes: RouteDefinition[] = [
  route({
    ...anything,
    method: 'post',
    path: '/api/things/search',
    request: { body: z.strictObject({ q: z.string(), deep: z.object({ n: z.int() }).optional() }) },
    response: { 200: z.object({ q: z.string() }) },
    handler: ({ input }) => Promise.resolve(ok({ q: input.body.q })),
  }),
  route({
    ...anything,
    method: 'get',
    path: '/api/things/:id',
    request: {
      params: z.object({ id: z.uuid() }),
      query: z.strictObject({ limit: z.coerce.number().int().max(100).optional() }),
    },
    response: { 200: z.object({ id: z.string(), limit: z.number().optional() }) },
    handler: ({ input }) => Promise.resolve(ok({ id: input.params.id, ...input.query })),
  }),
  route({
    ...anything,
    method: 'post',
    path: '/api/things',
    request: { body: z.strictObject({ how: z.string() }) },
    response: { 201: z.object({ made: z.boolean() }), 204: null },
    handler: ({ input }) => {
      if (input.body.how === 'broken') throw new Error('secret words of the inside');
      if (input.body.how === 'too much') {
        return Promise.resolve(created({ made: true, secret: 1 } as { made: boolean }));
      }
      if (input.body.how === 'busy') {
        return Promise.resolve(fail('unavailable', { retryAfterSeconds: 2.2 }));
      }
      return Promise.resolve(input.body.how === 'quietly' ? noContent() : created({ made: true }));
    },
  }),
  route({
    ...anything,
    method: 'post',
    path: '/api/twins',
    request: {},
    response: { 204: null },
    handler: async ({ context: { database } }) => {
      const twin = { address: 'somebody@home.example', reason: 'words about somebody' };
      await database.insert(suppressions).values([twin, twin]);
      return noContent();
    },
  }),
  route({
    ...anything,
    method: 'get',
    path: '/api/stream',
    keepsSessionAlive: false,
    request: {},
    response: { 200: eventStream },
    handler: () =>
      Promise.resolve(
        ok((response: Response) => {
          response.write('data: one\n\n');
          setTimeout(() => response.end('data: two\n\n'), 30);
        }),
      ),
  }),
  route({
    ...anything,
    method: 'get',
    path: '/api/files/:token.csv',
    access: 'public',
    request: { params: z.object({ token: z.string() }) },
    response: { 200: textAnswer('text/csv') },
    handler: ({ input }) => Promise.resolve(ok(`a,b\n${input.params.token},1\n`)),
  }),
];

describe('the way of a request', () => {
  let house: TestApp;
  let agent: Agent;

  beforeAll(async () => {
    house = await createTestApp({ extraRoutes: routes });
    agent = await agentFor(house, await buildUser(house.context.database));
  });
  afterAll(() => house.close());

  it('answers what the route declares', async () => {
    await agent.post('/api/things').send({ how: 'well' }).expect(201, { made: true });
    const empty = await agent.post('/api/things').send({ how: 'quietly' }).expect(204);
    expect(empty.text).toBe('');
    await agent.post('/api/things/search').send({ q: 'x' }).expect(200, { q: 'x' });
    const stream = await agent.get('/api/stream').set('Accept-Encoding', 'gzip').expect(200);
    expect(stream.headers['content-type']).toBe('text/event-stream; charset=utf-8');
    expect(stream.headers).not.toHaveProperty('content-encoding');
    expect(stream.text).toBe('data: one\n\ndata: two\n\n');
    const text = await agent.get('/api/files/tok.csv').expect(200);
    expect(text.headers['content-type']).toBe('text/csv; charset=utf-8');
    expect(text.text).toContain('tok,1');
  });

  it('answers a failure as a problem document whose id stands in the log, and tells nothing else', async () => {
    const reply = await agent.post('/api/things').send({ how: 'broken' }).expect(500);
    expect(reply.headers['content-type']).toBe('application/problem+json; charset=utf-8');
    expect(reply.body).toEqual({
      type: '/problems/internal',
      title: expect.any(String),
      status: 500,
      code: 'internal',
      id: expect.stringMatching(/^[0-9a-f-]{36}$/),
      errors: [],
    });
    const line = house.logged().find((entry) => entry['msg'] === 'a call failed');
    expect(line).toMatchObject({ req: { id: reply.body.id }, err: { message: /secret words/ } });
  });

  it('keeps out of the log what the database quotes in its complaints', async () => {
    await agent.post('/api/twins').expect(500);
    const logged = JSON.stringify(house.logged());
    expect(logged).toContain('suppressions_pkey');
    expect(logged).not.toContain('somebody');
  });

  it('logs each call in one line of JSON, by its template, in UTC, with ids alone', async () => {
    const id = randomUUID();
    await agent.get(`/api/things/${id}?limit=5`).expect(200);
    const line = house.logged().at(-1);
    expect(line).toEqual({
      level: 30,
      time: expect.stringMatching(/Z$/),
      req: { id: expect.any(String), method: 'GET' },
      res: { status: 200 },
      route: '/api/things/:id',
      userId: expect.any(String),
      ms: expect.any(Number),
      msg: 'call',
    });
  });

  it('says in the log what was refused and why, and nothing of what was sent', async () => {
    await agent.post('/api/things').send({ how: 'well', secret: 'hush' }).expect(422);
    const line = house.logged().at(-1);
    expect(line).toMatchObject({ res: { status: 422 }, code: 'invalid-request' });
    expect(JSON.stringify(line)).not.toContain('hush');
  });

  it('says when to try again', async () => {
    const reply = await agent.post('/api/things').send({ how: 'busy' }).expect(503);
    expect(reply.headers['retry-after']).toBe('3');
  });

  it('refuses JSON that cannot be read, too much of it, and what is not JSON', async () => {
    const send = (type: string, body: string) =>
      agent.post('/api/things').set('Content-Type', type).send(body);
    expect((await send('application/json', '{"how":').expect(400)).body.code).toBe(
      'unreadable-body',
    );
    const large = JSON.stringify({ how: 'x'.repeat(200_000) });
    expect((await send('application/json', large).expect(413)).body.code).toBe('body-too-large');
    expect((await send('text/plain', '{"how":"well"}').expect(415)).body.code).toBe('not-json');
    expect(
      (await send('application/x-www-form-urlencoded', 'how=well').expect(415)).body.code,
    ).toBe('not-json');
  });

  it.each([
    ['no body', undefined, ''],
    ['a bare word', '"well"', ''],
    ['a missing key', '{}', 'how'],
    ['a wrong type', '{"how":["well"]}', 'how'],
    ['an unknown key', '{"how":"well","role":"administrator"}', 'role'],
    [
      'a reach for the prototype',
      '{"how":"well","__proto__":{"role":"administrator"}}',
      '__proto__',
    ],
  ])('answers %s with one error a field', async (_name, body, path) => {
    const call = agent.post('/api/things').set('Content-Type', 'application/json');
    const reply = await (body === undefined ? call : call.send(body)).expect(422);
    expect(reply.body.code).toBe('invalid-request');
    expect(reply.body.errors.map((error: { path: string }) => error.path)).toEqual([path]);
  });

  it.each([
    '/api/things/not-a-uuid',
    `/api/things/${randomUUID()}?limit=1000`,
    `/api/things/${randomUUID()}?limit=1&limit=2`,
    `/api/things/${randomUUID()}?other=1`,
    `/api/things/${randomUUID()}?limit[]=1`,
  ])('holds path and query against the contract too: %s', async (path) => {
    expect((await agent.get(path).expect(422)).body.errors).toHaveLength(1);
  });

  it('knows no other address and no other method', async () => {
    expect((await agent.get('/api/nothing').expect(404)).body.code).toBe('not-found');
    expect((await agent.get('/%zz').expect(404)).body.code).toBe('not-found');
    const other = await agent.put('/api/things').send({}).expect(405);
    expect(other.headers['allow']).toBe('POST');
    const trace = await request(house.app).trace('/api/things').expect(405);
    expect(trace.body.code).toBe('method-not-allowed');
  });

  it('answers no field that the contract does not name, in the specs', async () => {
    await agent.post('/api/things').send({ how: 'too much' }).expect(500);
  });

  it('mounts no route that states no access, no audit, or takes another route’s calls', () => {
    const [first] = routes;
    const without = (key: 'access' | 'audit') =>
      ({ ...first, [key]: undefined }) as unknown as RouteDefinition;
    const mount = (list: RouteDefinition[]) => () => createApp(house.context, list);
    expect(mount([without('access')])).toThrow('states no access');
    expect(mount([{ ...without('access'), access: { roles: [] } }])).toThrow('states no access');
    expect(mount([without('audit')])).toThrow('states no audit');
    expect(mount([...routes, ...routes])).toThrow('Two routes take');
  });

  it('sends every reply of the API with the headers that keep it from running or staying', async () => {
    const calls = ['/api/health', '/api/auth/session', '/api/nothing', '/api/things/x'];
    for (const path of calls) {
      const { headers } = await agent.get(path);
      expect(headers).toMatchObject({
        'content-security-policy': "default-src 'none'; frame-ancestors 'none'",
        'x-content-type-options': 'nosniff',
        'referrer-policy': 'no-referrer',
        'x-frame-options': 'DENY',
        'cache-control': 'no-store',
      });
      expect(headers).not.toHaveProperty('x-powered-by');
      expect(headers).not.toHaveProperty('access-control-allow-origin');
      expect(headers['content-type']).toMatch(/charset=utf-8$/);
    }
  });

  it('keeps a person out without a session and tells a visitor who they are not', async () => {
    const stranger = await visitor(house);
    expect((await stranger.post('/api/things').send({ how: 'well' }).expect(401)).body.code).toBe(
      'unauthenticated',
    );
    expect((await stranger.get('/api/auth/session').expect(200)).body).toEqual({
      user: null,
      demo: false,
      demoAccounts: [],
    });
  });
});
