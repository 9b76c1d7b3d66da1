import { randomUUID } from 'node:crypto';
import request from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { createPasswordHasher, hashPassword } from '../../server/accounts/password-hash';
import { visitor } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';
import { minutes } from '../builders/test-clock';

const password = 'seven lanterns on the quay';

describe('guessing at passwords', () => {
  let house: TestApp;
  let second: TestApp;
  let passwordHash: string;

  beforeAll(async () => {
    house = await createTestApp();
    second = house.twin();
    passwordHash = await hashPassword(password);
  });
  afterAll(async () => {
    await second.close();
    await house.close();
  });
  // The address is the same for all of these; only the spec of it wants it to be spent.
  beforeEach(() =>
    house.context.database.$client.query(`DELETE FROM rate_limits WHERE key LIKE 'address%'`),
  );

  const someone = () => buildUser(house.context.database, { passwordHash });
  const tryOnce = async (app: TestApp, email: string, word: string) => {
    const agent = await visitor(app);
    return agent.post('/api/auth/sign-in').send({ email, password: word });
  };

  it('makes each try after the fifth wait twice as long, over all processes', async () => {
    const { email } = await someone();
    for (let n = 0; n < 5; n += 1) {
      expect((await tryOnce(n % 2 ? house : second, email, 'wrong')).status).toBe(401);
    }
    for (const wait of [1, 2, 4, 8, 16, 32, 64, 128, 256, 512, 900, 900]) {
      for (const app of [house, second]) {
        const refused = await tryOnce(app, email, password);
        expect(refused.status).toBe(429);
        expect(refused.body.code).toBe('too-many-requests');
        expect(refused.headers['retry-after']).toBe(String(wait));
      }
      house.clock.advance(wait * 1000);
      expect((await tryOnce(house, email, 'wrong')).status).toBe(401);
    }
  });

  it('starts afresh after the right password', async () => {
    const { email } = await someone();
    for (let n = 0; n < 4; n += 1) await tryOnce(house, email, 'wrong');
    expect((await tryOnce(house, email, password)).status).toBe(200);
    for (let n = 0; n < 5; n += 1) expect((await tryOnce(house, email, 'wrong')).status).toBe(401);
  });

  it('treats an address that nobody has alike', async () => {
    const email = `${randomUUID()}@clinic.example`;
    for (let n = 0; n < 5; n += 1) expect((await tryOnce(house, email, 'wrong')).status).toBe(401);
    const refused = await tryOnce(second, email.toUpperCase(), 'wrong');
    expect([refused.status, refused.headers['retry-after']]).toEqual([429, '1']);
  });

  it('lets many at once guess no more often than one after the other', async () => {
    const { email } = await someone();
    const agents = await Promise.all(
      Array.from({ length: 30 }, (_, n) => visitor(n % 2 ? house : second)),
    );
    const replies = await Promise.all(
      agents.map((agent) => agent.post('/api/auth/sign-in').send({ email, password: 'wrong' })),
    );
    expect(replies.filter((reply) => reply.status === 401)).toHaveLength(5);
    expect(replies.filter((reply) => reply.status === 429)).toHaveLength(25);
  });

  it('takes no more than a hundred wrong tries in a row, and opens again by a new password', async () => {
    const user = await someone();
    const pool = house.context.database.$client;
    await tryOnce(house, user.email, 'wrong');
    await pool.query('UPDATE rate_limits SET points = 99 WHERE key = $1', [`account:${user.id}`]);
    expect((await tryOnce(house, user.email, 'wrong')).status).toBe(401);
    house.clock.advance(minutes(24 * 60 * 40));
    const locked = await tryOnce(house, user.email, password);
    expect([locked.status, locked.headers['retry-after']]).toEqual([429, '900']);
  });

  it('never keeps an owner out of a browser that they signed in from', async () => {
    const user = await someone();
    const agent = await visitor(house);
    const signIn = (word: string) =>
      agent.post('/api/auth/sign-in').send({ email: user.email, password: word });
    await signIn(password).expect(200);
    await agent.post('/api/auth/sign-out').expect(204);
    for (let n = 0; n < 6; n += 1) await tryOnce(house, user.email, 'wrong');
    expect((await tryOnce(house, user.email, password)).status).toBe(429);
    await signIn(password).expect(200);
    expect((await tryOnce(house, user.email, password)).status).toBe(200);
    // The browser's own wrong tries are counted all the same, and its mark is good for this person alone.
    await agent.post('/api/auth/sign-out').expect(204);
    for (let n = 0; n < 5; n += 1) await signIn('wrong').expect(401);
    await signIn(password).expect(429);
    const other = await someone();
    for (let n = 0; n < 5; n += 1) await tryOnce(house, other.email, 'wrong');
    await agent.post('/api/auth/sign-in').send({ email: other.email, password }).expect(429);
  });

  it('refuses an address after a hundred tries in a minute, on every process, and says so in the audit', async () => {
    const agent = await visitor(house);
    const statuses = new Map<number, number>();
    for (let n = 0; n < 101; n += 1) {
      const call = request(n % 2 ? house.app : second.app).post('/api/auth/password');
      const cookie = `visitor=${agent.cookies['visitor']}; XSRF-TOKEN=${agent.cookies['XSRF-TOKEN']}`;
      const reply = await call
        .set('Cookie', cookie)
        .set('X-XSRF-TOKEN', agent.cookies['XSRF-TOKEN'] ?? '')
        .send({ token: `wrong ${n}`, password });
      statuses.set(reply.status, (statuses.get(reply.status) ?? 0) + 1);
    }
    expect([...statuses]).toEqual([
      [410, 100],
      [429, 1],
    ]);
    const { rows } = await house.context.database.$client.query(
      `SELECT action, details FROM audit_events ORDER BY sequence DESC LIMIT 1`,
    );
    expect(rows).toEqual([{ action: 'try.throttled', details: { by: 'address' } }]);
  });

  it('leaves signed-in staff alone: 300 calls from one address', async () => {
    const agent = await visitor(house);
    await agent
      .post('/api/auth/sign-in')
      .send({ email: (await someone()).email, password })
      .expect(200);
    const replies = await Promise.all(Array.from({ length: 300 }, () => agent.get('/api/sites')));
    expect(new Set(replies.map((reply) => reply.status))).toEqual(new Set([200]));
  });
});

describe('hashing passwords', () => {
  it('answers busy when too many wait, and goes on afterwards', async () => {
    const hasher = createPasswordHasher({ atOnce: 1, waiting: 2 });
    const results = await Promise.allSettled(
      Array.from({ length: 5 }, () => hasher.hash(password)),
    );
    expect(results.map((result) => result.status)).toEqual([
      'fulfilled',
      'fulfilled',
      'fulfilled',
      'rejected',
      'rejected',
    ]);
    expect(results[4]).toMatchObject({
      reason: { code: 'unavailable', details: { retryAfterSeconds: 2 } },
    });
    await expect(hasher.verify(await hasher.hash(password), password)).resolves.toBe(true);
    await expect(hasher.verify(null, password)).resolves.toBe(false);
  });
});
