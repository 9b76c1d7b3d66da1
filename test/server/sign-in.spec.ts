import argon2 from 'argon2';
import request from 'supertest';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { hashPassword } from '../../server/accounts/password-hash';
import { agentFor, visitor, type Agent } from '../builders/agent';
import { buildPatientWithAccount, buildSite, buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';
import { hours, minutes } from '../builders/test-clock';

const password = 'seven lanterns on the quay';

describe('signing in and out', () => {
  let house: TestApp;
  let passwordHash: string;

  beforeAll(async () => {
    house = await createTestApp();
    passwordHash = await hashPassword(password);
  });
  afterAll(() => house.close());

  const someone = (given: Parameters<typeof buildUser>[1] = {}) =>
    buildUser(house.context.database, { passwordHash, ...given });
  const signIn = (agent: Agent, email: string, word = password) =>
    agent.post('/api/auth/sign-in').send({ email, password: word });
  const whoami = async (agent: Agent) =>
    (await agent.get('/api/auth/session').expect(200)).body.user;
  const rows = async (text: string, values: unknown[] = []) =>
    (await house.context.database.$client.query(text, values)).rows;

  it('opens a session for the right password, however the address is written', async () => {
    const user = await someone({ roles: ['nurse', 'front-desk'], displayName: 'Maren Vasquez' });
    const agent = await visitor(house);
    const reply = await signIn(agent, user.email.toUpperCase()).expect(200);
    expect(reply.body).toEqual({
      user: {
        id: user.id,
        displayName: 'Maren Vasquez',
        email: user.email,
        roles: ['nurse', 'front-desk'],
        patientId: null,
      },
    });
    expect(await whoami(agent)).toMatchObject({ id: user.id });
  });

  it('tells a patient which record is theirs', async () => {
    const site = await buildSite(house.context.database);
    const { user, patient } = await buildPatientWithAccount(house.context.database, {
      siteId: site.id,
    });
    const agent = await agentFor(house, user);
    expect(await whoami(agent)).toMatchObject({ roles: ['patient'], patientId: patient.id });
  });

  it('sets a cookie that scripts cannot read, and keeps no id of a session anywhere', async () => {
    const user = await someone();
    const agent = await visitor(house);
    const reply = await signIn(agent, user.email).expect(200);
    const cookie = (reply.headers['set-cookie'] as unknown as string[]).find((line) =>
      line.startsWith('sid='),
    );
    expect(cookie).toMatch(/^sid=[^;]+; Path=\/; HttpOnly; SameSite=Lax$/);
    const sid = /^s:(.+)\./.exec(agent.cookies['sid'] ?? '')?.[1] ?? 'none';
    expect(sid).toHaveLength(43);
    expect(JSON.stringify(reply.body)).not.toContain(sid);
    expect(JSON.stringify(house.logged())).not.toContain(sid);
    const stored = await rows('SELECT * FROM sessions s, audit_events a');
    expect(JSON.stringify(stored)).not.toContain(sid);
    expect(JSON.stringify(house.logged())).not.toContain(user.email);
  });

  it('behind TLS marks its cookies as Secure and of this host alone', async () => {
    const behindTls = await createTestApp({
      settings: { secureCookies: true, origin: 'https://rehab.example' },
    });
    const user = await buildUser(behindTls.context.database, { passwordHash });
    const first = await request(behindTls.app).get('/api/auth/session');
    const given = first.headers['set-cookie'] as unknown as string[];
    const jar = given.map((line) => line.split(';')[0]);
    const token = /XSRF-TOKEN=([^;]+)/.exec(jar.join(';'))?.[1] ?? '';
    const reply = await request(behindTls.app)
      .post('/api/auth/sign-in')
      .set('Cookie', jar.join('; '))
      .set('X-XSRF-TOKEN', decodeURIComponent(token))
      .send({ email: user.email, password })
      .expect(200);
    const set = [...given, ...(reply.headers['set-cookie'] as unknown as string[])];
    expect(set.map((line) => line.split('=')[0]).sort()).toEqual([
      'XSRF-TOKEN',
      'XSRF-TOKEN',
      '__Host-device',
      '__Host-sid',
      '__Host-visitor',
    ]);
    for (const line of set) expect(line).toMatch(/; Path=\/(;|$).*Secure/);
    for (const line of set) expect(line).not.toContain('Domain');
    expect(reply.headers['strict-transport-security']).toBe('max-age=31536000; includeSubDomains');
    await behindTls.close();
  });

  it('renews the id: one that was planted before opens nothing', async () => {
    const [first, second] = [await someone(), await someone()];
    const attacker = await agentFor(house, first);
    const planted = attacker.cookies['sid'] ?? '';
    const victim = await visitor(house);
    Object.assign(victim.cookies, { ...attacker.cookies });
    await signIn(victim, second.email).expect(200);
    expect(victim.cookies['sid']).not.toBe(planted);
    Object.assign(attacker.cookies, { sid: planted });
    expect(await whoami(attacker)).toBeNull();
    expect(await whoami(victim)).toMatchObject({ id: second.id });
  });

  it('gives two sign-ins two sessions', async () => {
    const user = await someone();
    const [one, two] = [await visitor(house), await visitor(house)];
    await signIn(one, user.email).expect(200);
    await signIn(two, user.email).expect(200);
    expect(one.cookies['sid']).not.toBe(two.cookies['sid']);
    await one.post('/api/auth/sign-out').expect(204);
    expect(await whoami(two)).toMatchObject({ id: user.id });
  });

  it('ends the session for good at sign-out', async () => {
    const user = await someone();
    const agent = await visitor(house);
    await signIn(agent, user.email).expect(200);
    const before = { ...agent.cookies };
    const reply = await agent.post('/api/auth/sign-out').expect(204);
    expect(reply.headers['clear-site-data']).toBe('"cache"');
    expect(agent.cookies['sid']).toBe('');
    Object.assign(agent.cookies, before);
    expect(await whoami(agent)).toBeNull();
    await agent.get('/api/sites').expect(401);
    expect(await rows('SELECT 1 FROM sessions WHERE user_id = $1', [user.id])).toEqual([]);
    await agent.get('/api/auth/session').expect(200);
    await agent.post('/api/auth/sign-out').expect(204);
  });

  it('keeps the token that a reply to sign-in and sign-out sets good for the next write', async () => {
    const user = await someone();
    const agent = await visitor(house);
    const before = agent.cookies['XSRF-TOKEN'];
    await signIn(agent, user.email).expect(200);
    const during = agent.cookies['XSRF-TOKEN'];
    await agent.post('/api/auth/sign-out').expect(204);
    const after = agent.cookies['XSRF-TOKEN'];
    expect(new Set([before, during, after]).size).toBe(3);
    await signIn(agent, user.email).expect(200);
  });

  describe('of a session’s life', () => {
    it.each([
      ['staff', ['nurse'] as const, 15],
      ['a patient', ['patient'] as const, 30],
    ])('ends it for %s after a while without a call', async (_who, roles, limit) => {
      const agent = await visitor(house);
      const user = await someone({ roles });
      await signIn(agent, user.email).expect(200);
      house.clock.advance(minutes(limit) - 1000);
      expect(await whoami(agent)).not.toBeNull();
      house.clock.advance(minutes(limit) - 1000);
      expect(await whoami(agent)).not.toBeNull();
      house.clock.advance(minutes(limit) + 1000);
      expect(await whoami(agent)).toBeNull();
      await agent.get('/api/sites').expect(401);
    });

    it('ends it after twelve hours whatever is done', async () => {
      const agent = await visitor(house);
      await signIn(agent, (await someone()).email).expect(200);
      for (let passed = 0; passed < hours(12) - minutes(10); passed += minutes(10)) {
        house.clock.advance(minutes(10));
        expect(await whoami(agent)).not.toBeNull();
      }
      house.clock.advance(minutes(10) + 1000);
      expect(await whoami(agent)).toBeNull();
    });

    it('moves its end at most once a minute', async () => {
      const user = await someone();
      const agent = await visitor(house);
      await signIn(agent, user.email).expect(200);
      const end = async () =>
        (await rows('SELECT expire FROM sessions WHERE user_id = $1', [user.id]))[0]
          ?.expire as Date;
      const first = await end();
      house.clock.advance(59_000);
      await whoami(agent);
      expect(await end()).toEqual(first);
      house.clock.advance(2_000);
      await whoami(agent);
      expect((await end()).getTime() - first.getTime()).toBe(61_000);
    });

    it('stays out of what a page asks by itself', async () => {
      const user = await someone();
      const agent = await visitor(house);
      await signIn(agent, user.email).expect(200);
      for (let minute = 0; minute < 15; minute += 1) {
        house.clock.advance(minutes(1));
        await agent.get('/api/health').expect(200);
      }
      expect(await whoami(agent)).toBeNull();
    });

    it('ends with the account, and follows its roles from the next request', async () => {
      const user = await someone({ roles: ['nurse'] });
      const agent = await agentFor(house, user);
      await agent.get('/api/users').expect(403);
      await rows(`UPDATE user_roles SET role = 'administrator' WHERE user_id = $1`, [user.id]);
      await agent.get('/api/users').expect(200);
      await rows('UPDATE users SET disabled_at = now() WHERE id = $1', [user.id]);
      await agent.get('/api/users').expect(401);
    });
  });

  describe('with what is wrong', () => {
    it('answers the same for a wrong password, an unknown address, a disabled and an invited account', async () => {
      const known = await someone();
      const disabled = await someone({ disabledAt: new Date() });
      const invited = await someone({ passwordHash: null });
      const tries: [string, string][] = [
        [known.email, 'not the password at all'],
        ['nobody@clinic.example', password],
        [disabled.email, password],
        [invited.email, password],
      ];
      const replies = [];
      for (const [email, word] of tries) {
        const reply = await signIn(await visitor(house), email, word).expect(401);
        const { date: _date, 'content-length': _length, ...headers } = reply.headers;
        const { id: _id, ...body } = reply.body as Record<string, unknown>;
        replies.push({ headers: Object.keys(headers).sort(), body });
      }
      expect(replies[0]?.body).toMatchObject({ code: 'wrong-credentials', errors: [] });
      for (const reply of replies) expect(reply).toEqual(replies[0]);
    });

    it('hashes as often for an address that nobody has, or that may not come in', async () => {
      const hashing = vi.spyOn(argon2, 'verify');
      const accounts = [await someone(), await someone({ disabledAt: new Date() })];
      const addresses = [...accounts.map((user) => user.email), 'nobody-at-all@clinic.example'];
      for (const email of addresses) {
        hashing.mockClear();
        await signIn(await visitor(house), email, 'not the password at all').expect(401);
        expect(hashing).toHaveBeenCalledTimes(1);
        expect(hashing.mock.calls[0]?.[0]).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
      }
      hashing.mockRestore();
    });

    it('takes a password exactly as typed, but for how its accents are put together', async () => {
      const typed = 'Crème brûlée, twice a year';
      const user = await someone({ passwordHash: await hashPassword(typed.normalize('NFC')) });
      const wrong = [typed.toLowerCase(), `${typed} `, typed.slice(0, -1), `${typed}!`];
      for (const word of wrong.slice(0, 4)) {
        await signIn(await visitor(house), user.email, word).expect(401);
      }
      await signIn(await visitor(house), user.email, typed.normalize('NFD')).expect(200);
    });

    it('asks for both fields, and for no more', async () => {
      const agent = await visitor(house);
      const send = (body: object) => agent.post('/api/auth/sign-in').send(body).expect(422);
      expect((await send({ email: 'a@clinic.example' })).body.errors[0].path).toBe('password');
      expect((await send({ email: 'no address', password })).body.errors[0].path).toBe('email');
      await send({ email: 'a@clinic.example', password, role: 'administrator' });
      await send({ email: ['a@clinic.example'], password });
    });
  });

  it('hashes anew when the parameters have risen', async () => {
    const weak = await argon2.hash(password, { memoryCost: 8192, timeCost: 2, parallelism: 1 });
    const user = await someone({ passwordHash: weak });
    await signIn(await visitor(house), user.email).expect(200);
    const [row] = await rows('SELECT password_hash FROM users WHERE id = $1', [user.id]);
    expect(row?.password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
    await signIn(await visitor(house), user.email).expect(200);
  });

  it('records who came, who failed and who left, and from where', async () => {
    const user = await someone();
    const agent = await visitor(house);
    await signIn(agent, user.email, 'not the password at all').expect(401);
    await signIn(agent, user.email).expect(200);
    await agent.post('/api/auth/sign-out').expect(204);
    const events = await rows(
      `SELECT action, outcome, actor_id, ip IS NOT NULL AS ip, session_hash IS NOT NULL AS session
         FROM audit_events WHERE object_id = $1 ORDER BY sequence`,
      [user.id],
    );
    expect(events).toEqual([
      { action: 'sign-in', outcome: 'failure', actor_id: null, ip: true, session: false },
      { action: 'sign-in', outcome: 'success', actor_id: user.id, ip: true, session: true },
      { action: 'sign-out', outcome: 'success', actor_id: user.id, ip: true, session: true },
    ]);
  });
});
