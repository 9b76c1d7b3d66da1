import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { agentFor, type Agent } from '../builders/agent';
import { throughGate } from '../builders/gate';
import { buildPatient, buildPatientWithAccount, buildSite, buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

describe('accounts, as administrators keep them', () => {
  let house: TestApp;
  let administrator: Awaited<ReturnType<typeof buildUser>>;
  let agent: Agent;
  let siteId: string;

  beforeAll(async () => {
    house = await createTestApp();
    siteId = (await buildSite(house.context.database)).id;
    administrator = await buildUser(house.context.database, {
      roles: ['administrator'],
      passwordHash: 'never compared',
    });
    agent = await agentFor(house, administrator);
  });
  afterAll(() => house.close());

  const rows = async (text: string, values: unknown[] = []) =>
    (await house.context.database.$client.query(text, values)).rows;
  const newcomer = (given: object = {}) => ({
    email: `${randomUUID()}@clinic.example`,
    displayName: 'New Nurse',
    roles: ['nurse'],
    siteIds: [siteId],
    ...given,
  });

  it('invites a person, who can do nothing before choosing a password', async () => {
    const body = newcomer({ roles: ['nurse', 'front-desk'], student: true });
    const made = await agent.post('/api/users').send(body).expect(201);
    expect(made.body).toEqual({
      id: expect.any(String),
      email: body.email,
      displayName: 'New Nurse',
      status: 'invited',
      roles: ['nurse', 'front-desk'],
      siteIds: [siteId],
      medicalDirector: false,
      student: true,
    });
    const messages = await rows('SELECT kind, subject FROM outbox WHERE user_id = $1', [
      made.body.id,
    ]);
    expect(messages).toEqual([{ kind: 'invitation', subject: { userId: made.body.id } }]);
    const events = await rows(
      `SELECT actor_id, details FROM audit_events WHERE action = 'user.invited' AND object_id = $1`,
      [made.body.id],
    );
    expect(events).toEqual([
      {
        actor_id: administrator.id,
        details: { roles: ['nurse', 'front-desk'], siteIds: [siteId] },
      },
    ]);
  });

  it('refuses an address in use in any writing, a site that is none, no role, the patient’s role and more', async () => {
    const first = newcomer();
    await agent.post('/api/users').send(first).expect(201);
    const twin = await agent
      .post('/api/users')
      .send({ ...first, email: first.email.toUpperCase() })
      .expect(409);
    expect(twin.body.code).toBe('email-taken');
    const wrong = [
      { siteIds: [randomUUID()] },
      { roles: [] },
      { roles: ['patient'] },
      { id: randomUUID() },
    ];
    for (const given of wrong) await agent.post('/api/users').send(newcomer(given)).expect(422);
    expect(await rows('SELECT 1 FROM outbox WHERE user_id IS NULL')).toEqual([]);
  });

  it('tells staff from patients, and lists who is both on either list', async () => {
    const { database } = house.context;
    const nurse = await buildUser(database, { roles: ['nurse'] });
    const patient = await buildUser(database, { roles: ['patient'] });
    const both = await buildUser(database, { roles: ['patient', 'nurse'] });
    const listed = async (who: string) => {
      const { body } = await agent.get(`/api/users?who=${who}&limit=100`).expect(200);
      const ids = body.items.map((user: { id: string }) => user.id);
      return [nurse, patient, both].map(({ id }) => ids.includes(id));
    };
    expect(await listed('staff')).toEqual([true, false, true]);
    expect(await listed('patients')).toEqual([false, true, true]);
  });

  it('reads one account', async () => {
    const nurse = await buildUser(house.context.database, { siteIds: [siteId] });
    const { body } = await agent.get(`/api/users/${nurse.id}`).expect(200);
    expect(body).toMatchObject({ id: nurse.id, status: 'invited', siteIds: [siteId] });
    await agent.get(`/api/users/${randomUUID()}`).expect(404);
  });

  it('lists accounts by name, page by page, each once', async () => {
    const names: string[] = [];
    let cursor: string | null = null;
    do {
      const query: string = `limit=2${cursor ? `&cursor=${cursor}` : ''}`;
      const page = (await agent.get(`/api/users?${query}`).expect(200)).body;
      names.push(...page.items.map((user: { id: string }) => user.id));
      cursor = page.nextCursor;
    } while (cursor);
    expect(new Set(names).size).toBe(names.length);
    const [{ count }] = (await rows('SELECT count(*)::int AS count FROM users')) as [
      { count: number },
    ];
    expect(names).toHaveLength(count);
    await agent.get('/api/users?cursor=nonsense').expect(422);
    await agent.get('/api/users?limit=101').expect(422);
  });

  it('changes roles, sites and marks, and leaves the rest', async () => {
    const user = await buildUser(house.context.database, { roles: ['nurse'] });
    const other = (await buildSite(house.context.database)).id;
    const change = { roles: ['physician'], siteIds: [other], medicalDirector: true };
    const reply = await agent.patch(`/api/users/${user.id}`).send(change).expect(200);
    expect(reply.body).toMatchObject({ ...change, displayName: user.displayName, student: false });
    await agent
      .patch(`/api/users/${user.id}`)
      .send({ siteIds: [randomUUID()] })
      .expect(422);
    await agent.patch(`/api/users/${user.id}`).send({ passwordHash: 'x' }).expect(422);
    await agent.patch(`/api/users/${randomUUID()}`).send({}).expect(404);
  });

  it('disables an account at once, with its sessions and links, and enables it again', async () => {
    const user = await buildUser(house.context.database);
    const open = await agentFor(house, user);
    await agent.patch(`/api/users/${user.id}`).send({ disabled: true }).expect(200);
    await open.get('/api/sites').expect(401);
    const back = await agent.patch(`/api/users/${user.id}`).send({ disabled: false }).expect(200);
    expect(back.body.status).toBe('invited');
    await open.get('/api/sites').expect(401);
  });

  it('signs a person out everywhere', async () => {
    const user = await buildUser(house.context.database);
    const [one, two] = [await agentFor(house, user), await agentFor(house, user)];
    await agent.delete(`/api/users/${user.id}/sessions`).expect(204);
    for (const open of [one, two]) await open.get('/api/sites').expect(401);
    await agent.delete(`/api/users/${randomUUID()}/sessions`).expect(404);
  });

  it('keeps at least one administrator, also when two take the role from each other at once', async () => {
    const other = await buildUser(house.context.database, {
      roles: ['administrator'],
      passwordHash: 'never compared',
    });
    const second = await agentFor(house, other);
    // Both calls are let in, wait for the same moment, and go on together.
    const gate = {
      lock: 'SELECT FROM users WHERE id = ANY ($1) FOR UPDATE',
      values: [[other.id, administrator.id]],
      until: 2,
    };
    const replies = await throughGate(house, gate, () => [
      agent.patch(`/api/users/${other.id}`).send({ roles: ['nurse'] }),
      second.patch(`/api/users/${administrator.id}`).send({ disabled: true }),
    ]);
    const [done, refused] = replies.map((reply) => reply.status).sort();
    expect(done).toBe(200);
    // Whoever comes a moment later is no administrator any more, or signed out, when the call is looked at.
    expect([401, 403, 409]).toContain(refused);
    const left = await rows(
      `SELECT 1 FROM users u JOIN user_roles r ON r.user_id = u.id
        WHERE r.role = 'administrator' AND u.disabled_at IS NULL AND u.id = ANY($1)`,
      [[administrator.id, other.id]],
    );
    expect(left).toHaveLength(1);
    await rows(
      `INSERT INTO user_roles (user_id, role) VALUES ($1, 'administrator') ON CONFLICT DO NOTHING`,
      [administrator.id],
    );
    await rows('UPDATE users SET disabled_at = NULL WHERE id = $1', [administrator.id]);
    await rows(`DELETE FROM user_roles WHERE user_id = $1 AND role = 'administrator'`, [other.id]);
    agent = await agentFor(house, administrator);
    await agent.patch(`/api/users/${administrator.id}`).send({ disabled: true }).expect(409);
  });

  it('invites again only who has not come yet, and at most once an hour', async () => {
    const made = (await agent.post('/api/users').send(newcomer()).expect(201)).body;
    await agent.post(`/api/users/${made.id}/invitation`).expect(204);
    expect(await rows('SELECT 1 FROM outbox WHERE user_id = $1', [made.id])).toHaveLength(1);
    await agent.post(`/api/users/${administrator.id}/invitation`).expect(409);
  });

  describe('of patients', () => {
    it('are made from the record, once, and belong to it', async () => {
      const desk = await agentFor(
        house,
        await buildUser(house.context.database, { roles: ['front-desk'], siteIds: [siteId] }),
      );
      const email = `${randomUUID()}@home.example`;
      const patient = await buildPatient(house.context.database, { siteId, email });
      await desk.post(`/api/patients/${patient.id}/invitation`).expect(204);
      await desk.post(`/api/patients/${patient.id}/invitation`).expect(204);
      const found = await rows(
        `SELECT u.email, r.role FROM patients p JOIN users u ON u.id = p.user_id JOIN user_roles r ON r.user_id = u.id
          WHERE p.id = $1`,
        [patient.id],
      );
      expect(found).toEqual([{ email, role: 'patient' }]);
      const twin = await buildPatient(house.context.database, { siteId, email });
      expect((await desk.post(`/api/patients/${twin.id}/invitation`).expect(409)).body.code).toBe(
        'email-taken',
      );
      const silent = await buildPatient(house.context.database, { siteId });
      const refused = await desk.post(`/api/patients/${silent.id}/invitation`).expect(422);
      expect(refused.body.errors[0].path).toBe('email');
    });

    it('are out of reach for other sites’ staff, and leave a record of the attempt', async () => {
      const elsewhere = (await buildSite(house.context.database)).id;
      const desk = await buildUser(house.context.database, {
        roles: ['front-desk'],
        siteIds: [elsewhere],
      });
      const { patient } = await buildPatientWithAccount(house.context.database, { siteId });
      const stranger = await agentFor(house, desk);
      await stranger.post(`/api/patients/${patient.id}/invitation`).expect(404);
      await stranger.post(`/api/patients/${randomUUID()}/invitation`).expect(404);
      const events = await rows(
        `SELECT action, outcome, patient_id FROM audit_events WHERE actor_id = $1`,
        [desk.id],
      );
      expect(events).toEqual([
        { action: 'record.refused', outcome: 'refused', patient_id: patient.id },
      ]);
    });
  });
});
