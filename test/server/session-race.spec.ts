import type { SessionData } from 'express-session';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { noContent } from '../../server/http/answers';
import { route } from '../../server/http/route';
import { sessionHash, SessionStore } from '../../server/http/session-store';
import { agentFor } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';
import { minutes } from '../builders/test-clock';

/** Requests that are under way, each held until it is let go on. */
const underWay: (() => void)[] = [];

/** Changes its session and takes its time, as a slow request would. */
const slow = route({
  method: 'post',
  path: '/api/slow',
  summary: 'For a spec',
  access: 'signed-in',
  audit: 'none',
  transaction: 'none',
  request: {},
  response: { 204: null },
  handler: async ({ http }) => {
    Object.assign(http.request.session, { seen: 'slowly' });
    await new Promise<void>((goOn) => underWay.push(goOn));
    return noContent();
  },
});

describe('a session that ends while a request is under way', () => {
  let house: TestApp;

  beforeAll(async () => {
    house = await createTestApp({ extraRoutes: [slow] });
  });
  afterAll(() => house.close());

  /** Theirs, and any that came back as nobody's. */
  const sessionsOf = async (userId: string) =>
    (
      await house.context.database.$client.query(
        'SELECT 1 FROM sessions WHERE user_id = $1 OR user_id IS NULL',
        [userId],
      )
    ).rowCount;

  /** People who sign out while a request of theirs goes on. @returns how it ended, and how many sessions are left */
  async function signOutMeanwhile(count: number) {
    const users = await Promise.all(
      Array.from({ length: count }, () => buildUser(house.context.database)),
    );
    const agents = await Promise.all(users.map((user) => agentFor(house, user)));
    const pending = agents.map((agent) => agent.post('/api/slow').then((reply) => reply.status));
    await vi.waitFor(() => expect(underWay).toHaveLength(count), 20_000);
    await Promise.all(agents.map((agent) => agent.post('/api/auth/sign-out').expect(204)));
    for (const goOn of underWay.splice(0)) goOn();
    const statuses = await Promise.all(pending);
    return Promise.all(users.map(async ({ id }, at) => [statuses[at], await sessionsOf(id)]));
  }

  it('does not come back when the slow request saves it: 0 of 60', async () => {
    const left = await signOutMeanwhile(60);
    expect(new Set(left.map(([, count]) => count))).toEqual(new Set([0]));
    expect(left.filter(([status]) => status === 204).length).toBeGreaterThan(0);
  });

  it('would come back from a store that writes as the package does', async () => {
    const set = vi.spyOn(SessionStore.prototype, 'set').mockImplementation((sid, data, done) => {
      const upsert = `INSERT INTO sessions (sid, sess, expire, created_at) VALUES ($1, $2, $3, $3)
        ON CONFLICT (sid) DO UPDATE SET sess = EXCLUDED.sess`;
      const values = [sessionHash(sid), data, house.clock.now()];
      void house.context.database.$client.query(upsert, values).then(() => done?.());
    });
    const left = await signOutMeanwhile(20);
    set.mockRestore();
    expect(left.some(([, count]) => (count ?? 0) > 0)).toBe(true);
    await house.context.database.$client.query('DELETE FROM sessions WHERE user_id IS NULL');
  });

  it('does not come back by being touched or set, and a change of a live one is kept', async () => {
    const { database, clock } = house.context;
    const store = new SessionStore(database.$client, clock);
    const user = await buildUser(database);
    const agent = await agentFor(house, user);
    const pending = agent.post('/api/slow').then((reply) => reply.status);
    await vi.waitFor(() => expect(underWay).toHaveLength(1));
    underWay.pop()?.();
    expect(await pending).toBe(204);
    const { rows } = await database.$client.query('SELECT sess FROM sessions WHERE user_id = $1', [
      user.id,
    ]);
    expect(rows[0].sess).toMatchObject({ seen: 'slowly' });

    const sid = /^s:(.+)\./.exec(agent.cookies['sid'] ?? '')?.[1] ?? '';
    const data = await new Promise<SessionData>((resolve, reject) => {
      store.get(sid, (error, found) => {
        if (found) resolve(found);
        else reject(error instanceof Error ? error : new Error('No such session'));
      });
    });
    await new Promise((resolve) => store.destroy(sid, resolve));
    house.clock.advance(minutes(2));
    await new Promise((resolve) => store.touch(sid, data, resolve));
    await new Promise((resolve) => store.set(sid, data, resolve));
    expect(await sessionsOf(user.id)).toBe(0);
  });

  it('fails closed: a store that cannot be read answers 503, never as a visitor', async () => {
    const broken = await createTestApp();
    const agent = await agentFor(broken, await buildUser(broken.context.database));
    await broken.context.database.$client.end();
    const reply = await agent.get('/api/auth/session');
    expect([reply.status, reply.body.code]).not.toEqual([200, undefined]);
    expect(reply.status).toBeGreaterThanOrEqual(500);
    await broken.testDatabase.drop();
  });
});
