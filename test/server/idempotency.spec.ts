import { randomUUID } from 'node:crypto';
import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { created } from '../../server/http/answers';
import { fail } from '../../server/http/failure';
import { route } from '../../server/http/route';
import { agentFor, type Agent } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';
import { hours } from '../builders/test-clock';

/** Writes a row that can be counted, slowly enough for others to arrive meanwhile. */
const keyed = route({
  method: 'post',
  path: '/api/notes',
  summary: 'For a spec',
  access: 'signed-in',
  audit: { action: 'note.made', objectType: 'note', objectId: ({ result }) => result.body.id },
  idempotent: true,
  request: { body: z.strictObject({ reason: z.string(), refuse: z.boolean().optional() }) },
  response: { 201: z.object({ id: z.uuid(), reason: z.string() }) },
  handler: async ({ tx, input: { body } }) => {
    const id = randomUUID();
    await tx.connection.query('INSERT INTO suppressions (address, reason) VALUES ($1, $2)', [
      id,
      body.reason,
    ]);
    await tx.connection.query('SELECT pg_sleep(0.02)');
    return body.refuse ? fail('class-full') : created({ id, reason: body.reason });
  },
});

describe('a request that is sent again', () => {
  let house: TestApp;
  let second: TestApp;
  let agent: Agent;
  let other: Agent;

  beforeAll(async () => {
    house = await createTestApp({ extraRoutes: [keyed] });
    second = house.twin();
    const user = await buildUser(house.context.database);
    agent = await agentFor(house, user);
    other = await agentFor(house, await buildUser(house.context.database));
  });
  afterAll(async () => {
    await second.close();
    await house.close();
  });

  const send = (key: string, body: object, by = agent) =>
    by.post('/api/notes').set('Idempotency-Key', key).send(body);
  const made = async (reason: string) =>
    (
      await house.context.database.$client.query('SELECT 1 FROM suppressions WHERE reason = $1', [
        reason,
      ])
    ).rowCount;

  it('is answered as the first time, and done once', async () => {
    const key = randomUUID();
    const first = await send(key, { reason: 'once' }).expect(201);
    const again = await send(key, { reason: 'once' }).expect(201);
    expect(again.body).toEqual(first.body);
    expect(await made('once')).toBe(1);
  });

  it('is refused with another body, by the same person alone', async () => {
    const key = randomUUID();
    await send(key, { reason: 'mine' }).expect(201);
    expect((await send(key, { reason: 'changed' }).expect(409)).body.code).toBe(
      'idempotency-key-reused',
    );
    await send(key, { reason: 'theirs' }, other).expect(201);
  });

  it('is done once when many arrive at once, through two processes', async () => {
    const key = randomUUID();
    const user = await buildUser(house.context.database);
    const doors = await Promise.all(
      [house, second, house, second].map((app) => agentFor(app, user)),
    );
    const replies = await Promise.all(
      Array.from({ length: 20 }, (_, n) => send(key, { reason: 'stampede' }, doors[n % 4])),
    );
    expect(new Set(replies.map((reply) => reply.status))).toEqual(new Set([201]));
    expect(new Set(replies.map((reply) => reply.body.id)).size).toBe(1);
    expect(await made('stampede')).toBe(1);
  });

  it('may be tried anew when nothing was done the first time', async () => {
    const key = randomUUID();
    await send(key, { reason: 'refused', refuse: true }).expect(409);
    expect(await made('refused')).toBe(0);
    await send(key, { reason: 'refused' }).expect(201);
  });

  it('is a new request after a day', async () => {
    const key = randomUUID();
    const user = await buildUser(house.context.database);
    const first = await send(key, { reason: 'daily' }, await agentFor(house, user)).expect(201);
    house.clock.advance(hours(24) - 1);
    const same = await send(key, { reason: 'daily' }, await agentFor(house, user)).expect(201);
    house.clock.advance(1);
    const anew = await send(key, { reason: 'daily' }, await agentFor(house, user)).expect(201);
    expect(same.body.id).toBe(first.body.id);
    expect(anew.body.id).not.toBe(first.body.id);
  });

  it('needs a key of 1 to 255 characters', async () => {
    agent = await agentFor(house, await buildUser(house.context.database));
    const without = await agent.post('/api/notes').send({ reason: 'keyless' }).expect(422);
    expect(without.body.errors[0].path).toBe('Idempotency-Key');
    await send('', { reason: 'keyless' }).expect(422);
    await send('k'.repeat(256), { reason: 'keyless' }).expect(422);
    await send('k'.repeat(255), { reason: 'keyless' }).expect(201);
    expect(await made('keyless')).toBe(1);
  });
});
