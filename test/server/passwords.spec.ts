import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { hashPassword } from '../../server/accounts/password-hash';
import { offerFirstAdministrator } from '../../server/accounts/first-administrator-service';
import { issueToken, type TokenPurpose } from '../../server/accounts/tokens-service';
import { inTransaction } from '../../server/database/transaction';
import { agentFor, visitor } from '../builders/agent';
import { buildUser } from '../builders/people';
import { runJobs as runDueJobs } from '../builders/run-jobs';
import { createTestApp, type TestApp } from '../builders/test-app';
import { hours } from '../builders/test-clock';

const old = 'seven lanterns on the quay';
const fresh = 'eleven herons under a bridge';

describe('a new password', () => {
  let house: TestApp;
  let passwordHash: string;

  beforeAll(async () => {
    house = await createTestApp();
    passwordHash = await hashPassword(old);
  });
  afterAll(() => house.close());
  beforeEach(() => house.context.database.$client.query('DELETE FROM rate_limits'));

  const someone = (given: Parameters<typeof buildUser>[1] = {}) =>
    buildUser(house.context.database, { passwordHash, ...given });
  const linkFor = (userId: string, purpose: TokenPurpose = 'password-reset') =>
    inTransaction(house.context.database, (tx) =>
      issueToken(tx, purpose, userId, house.clock.now()),
    );
  const set = async (token: string, password = fresh) =>
    (await visitor(house)).post('/api/auth/password').send({ token, password });
  const signIn = async (email: string, password: string) =>
    (await visitor(house)).post('/api/auth/sign-in').send({ email, password });
  const rows = async (text: string, values: unknown[] = []) =>
    (await house.context.database.$client.query(text, values)).rows;

  /** Sending is not this spec's. */
  const runJobs = () => runDueJobs(house, ['offer-password-reset']);

  describe('by a link', () => {
    it('is set once, ends every session and forgives what was guessed before', async () => {
      const user = await someone();
      const open = await agentFor(house, user);
      for (let n = 0; n < 6; n += 1) await signIn(user.email, 'wrong');
      const token = await linkFor(user.id);
      expect((await set(token)).status).toBe(204);
      await open.get('/api/sites').expect(401);
      expect((await signIn(user.email, old)).status).toBe(401);
      expect((await signIn(user.email, fresh)).status).toBe(200);
      const again = await set(token, 'and another one for later');
      expect([again.status, again.body.code]).toEqual([410, 'link-expired']);
    });

    it('lets one of several at once through', async () => {
      const token = await linkFor((await someone()).id);
      const replies = await Promise.all(Array.from({ length: 8 }, () => set(token)));
      expect(replies.map((reply) => reply.status).sort()).toEqual([204, ...Array(7).fill(410)]);
    });

    it('voids the other links of the person, and nobody else’s', async () => {
      const [user, other] = [await someone(), await someone()];
      const [first, second, theirs] = [
        await linkFor(user.id),
        await linkFor(user.id, 'invitation'),
        await linkFor(other.id),
      ];
      expect((await set(second)).status).toBe(204);
      expect((await set(first)).status).toBe(410);
      expect((await set(theirs)).status).toBe(204);
    });

    it.each([
      ['password-reset', 1],
      ['invitation', 72],
    ] as const)('expires: %s after %i h', async (purpose, life) => {
      const user = await someone();
      const [good, late] = [
        await linkFor(user.id, purpose),
        await linkFor((await someone()).id, purpose),
      ];
      house.clock.advance(hours(life) - 1000);
      expect((await set(good)).status).toBe(204);
      house.clock.advance(2000);
      expect((await set(late)).status).toBe(410);
    });

    it('is for a password alone: another kind of link, a disabled account and a made-up one do nothing', async () => {
      const first = await inTransaction(house.context.database, (tx) =>
        issueToken(tx, 'first-administrator', null, house.clock.now()),
      );
      const gone = await someone({ disabledAt: new Date() });
      for (const token of [first, await linkFor(gone.id), 'A'.repeat(43)]) {
        expect((await set(token)).status).toBe(410);
      }
    });

    it('keeps the link good when the password is refused, and says what to do', async () => {
      const user = await someone({ displayName: 'Nora Castellan' });
      const token = await linkFor(user.id);
      const refused = await set(token, 'Castellan-Nora-2026');
      expect(refused.status).toBe(422);
      expect(refused.body.errors).toEqual([
        { path: 'password', code: 'context', message: expect.stringContaining('unrelated words') },
      ]);
      expect((await set(token, 'passwordpassword')).body.errors[0].code).toBe('common');
      expect((await set(token, 'short')).status).toBe(422);
      expect((await set(token, 'x'.repeat(10_000))).status).toBe(422);
      expect((await set(token)).status).toBe(204);
    });

    it('keeps only the hash of a link', async () => {
      const token = await linkFor((await someone()).id);
      expect(token).toMatch(/^[\w-]{43}$/);
      const kept = JSON.stringify(await rows('SELECT * FROM user_tokens'));
      expect(kept).not.toContain(token);
      await set(token);
      expect(JSON.stringify(house.logged())).not.toContain(token);
      expect(JSON.stringify(await rows('SELECT * FROM audit_events'))).not.toContain(token);
    });
  });

  describe('forgotten', () => {
    const ask = async (email: string) =>
      (await visitor(house)).post('/api/auth/forgotten-password').send({ email });

    it('answers everybody alike, and writes to those who have an account', async () => {
      const user = await someone();
      const disabled = await someone({ disabledAt: new Date() });
      for (const email of [user.email, disabled.email, 'nobody@clinic.example']) {
        const reply = await ask(email);
        expect([reply.status, reply.text]).toEqual([204, '']);
      }
      await runJobs();
      const messages = await rows('SELECT kind, user_id, subject FROM outbox');
      expect(messages).toEqual([
        { kind: 'password-reset', user_id: user.id, subject: { userId: user.id } },
      ]);
      const jobs = await rows(
        `SELECT key FROM graphile_worker.jobs WHERE task_identifier = 'send-message'`,
      );
      expect(jobs).toHaveLength(1);
    });

    it('writes once however often it is asked within five minutes', async () => {
      const user = await someone();
      for (let n = 0; n < 3; n += 1) await ask(user.email);
      await runJobs();
      expect(await rows('SELECT 1 FROM outbox WHERE user_id = $1', [user.id])).toHaveLength(1);
      house.clock.advance(hours(1));
      await ask(user.email);
      await runJobs();
      expect(await rows('SELECT 1 FROM outbox WHERE user_id = $1', [user.id])).toHaveLength(2);
    });

    it('does the same work for an address that nobody has', async () => {
      const user = await someone();
      const work = async (email: string) => {
        const before = await rows('SELECT count(*)::int FROM audit_events');
        await ask(email);
        const after = await rows('SELECT count(*)::int FROM audit_events');
        return after[0]?.count - before[0]?.count;
      };
      expect([await work(user.email), await work('nobody@clinic.example')]).toEqual([1, 1]);
    });
  });

  describe('changed by its owner', () => {
    it('needs the one in use, counts a wrong one as a try, and ends the other sessions', async () => {
      const user = await someone();
      const [here, elsewhere] = [await agentFor(house, user), await agentFor(house, user)];
      const change = (currentPassword: string, newPassword = fresh) =>
        here.post('/api/auth/change-password').send({ currentPassword, newPassword });
      expect((await change('not this one at all').expect(403)).body.code).toBe('wrong-password');
      await change(old, 'passwordpassword').expect(422);
      await change(old).expect(204);
      await here.get('/api/sites').expect(200);
      await elsewhere.get('/api/sites').expect(401);
      expect((await signIn(user.email, fresh)).status).toBe(200);
      for (let n = 0; n < 5; n += 1) await change('not this one at all').expect(403);
      await change(fresh, old).expect(429);
      const events = await rows(
        `SELECT outcome FROM audit_events WHERE action = 'password.changed' AND object_id = $1`,
        [user.id],
      );
      expect(events.filter((event) => event.outcome === 'success')).toHaveLength(1);
      expect(events.filter((event) => event.outcome === 'failure')).toHaveLength(6);
    });
  });
});

describe('an empty program', () => {
  let house: TestApp;
  beforeAll(async () => {
    house = await createTestApp();
  });
  afterAll(() => house.close());

  const make = async (token: string, email = 'first@clinic.example', password = fresh) =>
    (await visitor(house))
      .post('/api/auth/first-administrator')
      .send({ token, email, displayName: 'First Person', password });
  const tokenOf = (link: string | null) => link?.split('#token=')[1] ?? '';

  it('has its first administrator made by the link that its start prints, once, whoever tries at once', async () => {
    const [one, two] = [
      await offerFirstAdministrator(house.context),
      await offerFirstAdministrator(house.context),
    ];
    expect(one).toMatch(/^http:\/\/127\.0\.0\.1:3000\/first-administrator#token=[\w-]{43}$/);
    expect((await make('A'.repeat(43))).status).toBe(410);
    expect((await make(tokenOf(one), 'first@clinic.example', 'first person first')).status).toBe(
      422,
    );
    const replies = await Promise.all(
      [one, two, one, two].map((link, n) => make(tokenOf(link), `admin${n}@clinic.example`)),
    );
    expect(replies.map((reply) => reply.status).sort()).toEqual([204, 410, 410, 410]);
    expect(await offerFirstAdministrator(house.context)).toBeNull();
    const { rows } = await house.context.database.$client.query('SELECT email FROM users');
    expect(rows).toHaveLength(1);
    const agent = await visitor(house);
    await agent
      .post('/api/auth/sign-in')
      .send({ email: rows[0].email, password: fresh })
      .expect(200);
    await agent.get('/api/users').expect(200);
  });
});
