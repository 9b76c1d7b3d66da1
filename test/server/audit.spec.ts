import { randomUUID } from 'node:crypto';
import pg from 'pg';
import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sealAudit, verifyAudit } from '../../server/audit/audit-seals-service';
import { jobSource, recordAudit } from '../../server/audit/audit-service';
import { inTransaction } from '../../server/database/transaction';
import { ok } from '../../server/http/answers';
import { fail } from '../../server/http/failure';
import { route } from '../../server/http/route';
import { agentFor } from '../builders/agent';
import { buildPatient, buildSite, buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';
import { testClock } from '../builders/test-clock';

const TEN_YEARS = 10 * 365 * 24 * 60 * 60;

const params = z.object({ id: z.uuid() });
const about = { summary: 'For a spec', access: 'signed-in', method: 'post' } as const;
const routes = [
  route({
    ...about,
    path: '/api/charts/:id',
    patient: (input) => input.params.id,
    audit: {
      action: 'chart.read',
      objectType: 'chart',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
      details: ({ result }) => ({ pages: result.body.pages }),
    },
    request: { params },
    response: { 200: z.object({ pages: z.int() }) },
    handler: () => Promise.resolve(ok({ pages: 3 })),
  }),
  route({
    ...about,
    path: '/api/lists',
    audit: {
      action: 'list.read',
      objectType: 'list',
      patientId: ({ input }) => input.body.ids,
    },
    request: { body: z.strictObject({ ids: z.array(z.uuid()) }) },
    response: { 200: z.object({}) },
    handler: () => Promise.resolve(ok({})),
  }),
  route({
    ...about,
    path: '/api/changes',
    audit: { action: 'change.made', objectType: 'change' },
    request: {
      body: z.strictObject({ reason: z.string(), end: z.enum(['fail', 'throw', 'overlong']) }),
    },
    response: { 200: z.object({}) },
    handler: async ({ tx, input: { body }, audit }) => {
      await tx.connection.query('INSERT INTO suppressions (address, reason) VALUES ($1, $2)', [
        randomUUID(),
        body.reason,
      ]);
      if (body.end === 'throw') throw new Error('stop');
      // An event that the table does not take: the change must not stand without it.
      if (body.end === 'overlong') audit({ action: 'x', objectType: 'x', patientId: 'no id' });
      return body.end === 'fail' ? fail('class-full') : ok({});
    },
  }),
];

describe('the audit', () => {
  let house: TestApp;
  let owner: pg.Client;

  beforeAll(async () => {
    // Before the database's own clock, so that what is recorded is old enough to be sealed.
    const clock = testClock('2026-01-05T15:00:00Z');
    house = await createTestApp({ extraRoutes: routes, clock });
    owner = new pg.Client({ connectionString: house.testDatabase.ownerUrl });
    await owner.connect();
  });
  afterAll(async () => {
    await owner.end();
    await house.close();
  });

  const rows = async (text: string, values: unknown[] = []) =>
    (await house.context.database.$client.query(text, values)).rows;
  const nurse = async () => {
    const site = await buildSite(house.context.database);
    const user = await buildUser(house.context.database, { siteIds: [site.id] });
    const patient = await buildPatient(house.context.database, { siteId: site.id });
    return { user, patient, agent: await agentFor(house, user) };
  };

  it('tells of every read of a record who, what, whose, when, from where and how it went', async () => {
    const { user, patient, agent } = await nurse();
    await agent.post(`/api/charts/${patient.id}`).expect(200);
    const events = await rows('SELECT * FROM audit_events WHERE actor_id = $1', [user.id]);
    expect(events).toEqual([
      {
        sequence: expect.any(String),
        id: expect.any(String),
        at: house.clock.now(),
        actor_id: user.id,
        action: 'chart.read',
        object_type: 'chart',
        object_id: patient.id,
        patient_id: patient.id,
        ip: expect.stringContaining('127.0.0.1'),
        session_hash: expect.stringMatching(/^[\w-]{43}$/),
        outcome: 'success',
        details: { pages: 3 },
      },
    ]);
  });

  it('holds an event for each patient of a list, and one for a list of nobody', async () => {
    const { user, agent } = await nurse();
    const ids = [randomUUID(), randomUUID(), randomUUID()];
    await agent.post('/api/lists').send({ ids }).expect(200);
    await agent.post('/api/lists').send({ ids: [] }).expect(200);
    const events = await rows(
      'SELECT patient_id FROM audit_events WHERE actor_id = $1 ORDER BY sequence',
      [user.id],
    );
    expect(events.map((event) => event.patient_id)).toEqual([...ids, null]);
  });

  it.each([
    ['fail', 409],
    ['throw', 500],
    ['overlong', 500],
  ])('stands and falls with what it tells of: %s', async (end, status) => {
    const { user, agent } = await nurse();
    await agent.post('/api/changes').send({ reason: end, end }).expect(status);
    expect(await rows('SELECT 1 FROM suppressions WHERE reason = $1', [end])).toEqual([]);
    expect(await rows('SELECT 1 FROM audit_events WHERE actor_id = $1', [user.id])).toEqual([]);
  });

  it('takes the address of the caller from the connection, whatever headers say, unless a proxy is known', async () => {
    const { user, patient, agent } = await nurse();
    await agent.post(`/api/charts/${patient.id}`).set('X-Forwarded-For', '203.0.113.9').expect(200);
    const [event] = await rows('SELECT ip FROM audit_events WHERE actor_id = $1', [user.id]);
    expect(event?.ip).toContain('127.0.0.1');
    expect(event?.ip).not.toContain('203.0.113.9');
  });

  it.each(['audit_events', 'audit_seals'])(
    'can be changed by nobody: %s refuses the app’s role by right and its owner by trigger',
    async (table) => {
      for (const statement of [
        `UPDATE ${table} SET id = id`,
        `DELETE FROM ${table}`,
        `TRUNCATE ${table}`,
      ]) {
        await expect(rows(statement)).rejects.toMatchObject({ code: '42501' });
        await expect(owner.query(statement)).rejects.toMatchObject({ code: '23001' });
      }
    },
  );

  describe('sealed', () => {
    /** As one would who owns the database and wants to hide something. */
    async function tamper(statement: string, values: unknown[] = []): Promise<void> {
      await owner.query('ALTER TABLE audit_events DISABLE TRIGGER audit_events_append_only');
      await owner.query(statement, values);
      await owner.query('ALTER TABLE audit_events ENABLE TRIGGER audit_events_append_only');
    }
    const record = (count: number) =>
      inTransaction(house.context.database, (tx) =>
        recordAudit(
          tx,
          jobSource(house.clock.now()),
          Array.from({ length: count }, (_, n) => ({
            action: 'spec',
            objectType: 'spec',
            objectId: `${n}`,
          })),
        ),
      );
    const seal = () => sealAudit(house.context.database, 0);
    const verify = () => verifyAudit(house.context.database);

    it('is sealed in ranges that touch, by one of several at once', async () => {
      await record(3);
      const first = await Promise.all([seal(), seal(), seal()]);
      expect(first.flat()).toHaveLength(1);
      await record(2);
      const [second] = await seal();
      expect(second).toMatchObject({
        from: (first.flat()[0]?.to ?? 0) + 1,
        previous: first.flat()[0]?.digest,
      });
      expect(await seal()).toEqual([]);
      expect(await verify()).toEqual([]);
    });

    it('leaves alone what is too young, and waits for those who are still writing', async () => {
      await record(1);
      expect(await sealAudit(house.context.database, TEN_YEARS)).toEqual([]);
      let finish: () => void = () => undefined;
      const until = new Promise<void>((resolve) => (finish = resolve));
      const writing = inTransaction(house.context.database, async (tx) => {
        await recordAudit(tx, jobSource(house.clock.now()), [
          { action: 'slow', objectType: 'spec' },
        ]);
        await until;
      });
      await new Promise((resolve) => setTimeout(resolve, 50));
      await record(1);
      const sealing = seal();
      setTimeout(finish, 200);
      await Promise.all([writing, sealing]);
      expect(await verify()).toEqual([]);
    });

    it.each([
      ['changed', `UPDATE audit_events SET actor_id = gen_random_uuid() WHERE sequence = $1`],
      ['removed', `DELETE FROM audit_events WHERE sequence = $1`],
      [
        'put in between',
        `INSERT INTO audit_events (sequence, id, action, object_type) OVERRIDING SYSTEM VALUE
         SELECT g, gen_random_uuid(), 'forged', 'spec' FROM (SELECT $1::bigint + 1 AS g) s`,
      ],
    ])('shows what was %s afterwards', async (_how, statement) => {
      const [{ next }] = (await rows(`SELECT nextval('audit_events_sequence_seq') AS next`)) as [
        { next: string },
      ];
      await rows(`SELECT nextval('audit_events_sequence_seq')`);
      await record(2);
      const made = (await seal()).at(-1);
      const before = (await verify()).length;
      const at = statement.startsWith('INSERT') ? Number(next) : Number(made?.to);
      await tamper(statement, [at]);
      expect((await verify()).slice(before)).toEqual([expect.objectContaining({ to: made?.to })]);
    });
  });
});
