import { randomUUID } from 'node:crypto';
import type { Test } from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { roles, type Role } from '@shared/contracts/accounts-contract';
import { featureRoutes } from '../../server/features';
import type { RouteDefinition } from '../../server/http/route';
import { buildAccessWorld, type AccessWorld, type PatientRecord } from '../builders/access-world';
import type { Agent } from '../builders/agent';
import { openPaymentDesk, type PaymentDesk } from '../builders/payment-desk';
import { createTestApp, type TestApp } from '../builders/test-app';
import { accessTable, type AccessRow } from './access-table';

const nameOf = ({ method, path }: RouteDefinition): string => `${method.toUpperCase()} ${path}`;

const whoOf = (route: RouteDefinition): AccessRow['who'] => {
  if (route.access === 'public') return 'anyone';
  return route.access === 'signed-in' ? 'signed-in' : route.access.roles;
};

const may = (row: AccessRow, role: Role): boolean =>
  typeof row.who === 'string' || row.who.includes(role);

const unknown: Omit<PatientRecord, 'agent'> = {
  siteId: randomUUID(),
  patientId: randomUUID(),
  prescriptionId: randomUUID(),
  classDateId: randomUUID(),
  classTemplateId: randomUUID(),
  appointmentId: randomUUID(),
  chargeId: randomUUID(),
  sessionRecordId: randomUUID(),
  readingId: randomUUID(),
  proposalId: randomUUID(),
};

/** Done, or refused for a reason of the matter itself. */
const isAnAnswer = (status: number): boolean => status < 300 || status === 409;

describe('who may call what', () => {
  let desk: PaymentDesk;
  let house: TestApp;
  let world: AccessWorld;
  let routes: Map<string, RouteDefinition>;

  beforeAll(async () => {
    desk = await openPaymentDesk();
    house = await createTestApp({ payments: desk.payments });
    world = await buildAccessWorld(house);
    routes = new Map(featureRoutes(house.context).map((route) => [nameOf(route), route]));
  });
  afterAll(async () => {
    await house.close();
    await desk.close();
  });

  const rows = Object.entries(accessTable);
  const withRecord = rows.filter(([, row]) => row.record);

  function call(name: string, agent: Agent, record: Omit<PatientRecord, 'agent'>): Test {
    const [method = '', path = ''] = name.split(' ');
    const { id, query = '', body } = accessTable[name]?.record?.(record as PatientRecord) ?? {};
    const address = path.replace(':id', id ?? randomUUID()).replaceAll(/:\w+/g, randomUUID());
    const test = agent[method.toLowerCase() as 'post'](`${address}${query}`);
    test.set('Idempotency-Key', randomUUID());
    return body ? test.send(body) : test;
  }

  it('is written down for every mounted route, and for no other', () => {
    expect([...routes.keys()].sort()).toEqual(rows.map(([name]) => name).sort());
  });

  it.each(rows)('%s declares what is written down', (name, row) => {
    const route = routes.get(name);
    const declared = route && whoOf(route);
    const sorted = (who: AccessRow['who'] | undefined) =>
      Array.isArray(who) ? [...(who as Role[])].sort() : who;
    expect(sorted(declared)).toEqual(sorted(row.who));
    expect([row.record, row.none, row.guarded].filter(Boolean)).toHaveLength(1);
  });

  it.each(rows.filter(([, row]) => row.who !== 'anyone'))(
    '%s is closed to visitors, to the disabled and to every role that is not named',
    async (name, row) => {
      expect((await call(name, world.nobody, unknown)).status).toBe(401);
      expect((await call(name, world.disabled, unknown)).status).toBe(401);
      for (const role of roles) {
        const reply = await call(name, world.at[role], unknown);
        if (!may(row, role))
          expect([role, reply.status, reply.body.code]).toEqual([role, 403, 'forbidden']);
        else expect([role, reply.status]).not.toEqual([role, 403]);
        expect(reply.status).toBeLessThan(500);
      }
    },
  );

  it.each(withRecord)('%s gives nobody what belongs to others', async (name, row) => {
    const record = await world.newRecord();
    const strangers = roles.filter((role) => may(row, role) && !row.everySite?.includes(role));
    const agents = strangers.map((role) => [role, world.away[role]] as const);
    if (may(row, 'patient')) agents.push(['patient', world.at.patient]);
    for (const [role, agent] of agents) {
      const foreign = await call(name, agent, record);
      expect([role, foreign.status]).toEqual([role, row.strangers ?? 404]);
      expect(foreign.text).not.toContain(record.patientId);
      expect(foreign.text).not.toContain(record.appointmentId);
      if (row.strangers) continue;
      const nothing = await call(name, agent, unknown);
      expect([role, nothing.body.code]).toEqual([role, foreign.body.code]);
    }
  });

  it.each(withRecord)('%s lets those in whose business it is', async (name, row) => {
    const insiders = roles.filter((role) => may(row, role) && !row.notNow?.includes(role));
    for (const role of insiders) {
      const record = await world.newRecord();
      const { status, body } = await call(
        name,
        role === 'patient' ? record.agent : world.at[role],
        record,
      );
      const answer = [role, status, status < 400 ? '' : JSON.stringify(body)];
      expect(answer).toEqual([role, expect.toSatisfy(isAnAnswer), expect.any(String)]);
    }
  });

  it.each(rows.filter(([, row]) => row.guarded))('%s leaves its record to the house', (name) => {
    const input = { params: { id: 'whose' }, query: {}, headers: undefined, body: {} };
    expect(routes.get(name)?.patient?.(input as never)).toBe('whose');
  });

  it('leaves a record of each refusal', async () => {
    const count = async () =>
      (
        await house.context.database.$client.query(
          `SELECT count(*)::int AS count FROM audit_events WHERE action = 'access.refused' AND outcome = 'refused'`,
        )
      ).rows[0].count as number;
    const before = await count();
    await world.at.patient.get('/api/users').expect(403);
    await world.at.nurse.get('/api/users').expect(403);
    expect((await count()) - before).toBe(2);
  });
});
