import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { AuditEvent } from '@shared/contracts/audit-contract';
import { jobSource, recordAudit } from '../../server/audit/audit-service';
import { inTransaction } from '../../server/database/transaction';
import { agentFor, type Agent } from '../builders/agent';
import { buildPatient, buildSite, buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

describe('the list of the audit', () => {
  let house: TestApp;
  let agent: Agent;
  let patient: Awaited<ReturnType<typeof buildPatient>>;
  let nurse: Awaited<ReturnType<typeof buildUser>>;

  beforeAll(async () => {
    house = await createTestApp();
    const { database } = house.context;
    const { id: siteId } = await buildSite(database);
    patient = await buildPatient(database, { siteId });
    nurse = await buildUser(database);
    agent = await agentFor(house, await buildUser(database, { roles: ['administrator'] }));
    await inTransaction(database, async (tx) => {
      const source = { ...jobSource(house.clock.now()), actorId: nurse.id, ip: '192.0.2.7' };
      const about = { objectType: 'patient', objectId: patient.id, patientId: patient.id };
      await recordAudit(tx, source, [
        { action: 'patient.read', ...about },
        { action: 'patient.changed', ...about, details: { fields: ['phone'] } },
      ]);
      await recordAudit(tx, jobSource(house.clock.now()), [
        { action: 'reminder.sent', objectType: 'message' },
      ]);
    });
  });
  afterAll(() => house.close());

  const read = async (query: string): Promise<{ items: AuditEvent[]; nextCursor: string | null }> =>
    (await agent.get(`/api/audit?${query}`).expect(200)).body;

  it('tells who did what to which record, by its number and not by its name', async () => {
    const { items } = await read('action=patient.changed');
    expect(items).toEqual([
      {
        id: expect.any(String),
        at: house.clock.now().toISOString(),
        actor: { id: nurse.id, displayName: nurse.displayName },
        action: 'patient.changed',
        outcome: 'success',
        objectType: 'patient',
        objectId: patient.id,
        patient: { id: patient.id, recordNumber: patient.recordNumber },
        ip: '192.0.2.7',
        details: { fields: ['phone'] },
      },
    ]);
    const [job] = (await read('action=reminder.')).items;
    expect([job?.actor, job?.patient]).toEqual([null, null]);
  });

  it('lists by person, by record and by the beginning of an action', async () => {
    const actions = async (query: string) =>
      (await read(query)).items.map(({ action }) => action).filter((one) => one !== 'audit.read');
    expect(await actions(`actorId=${nurse.id}`)).toEqual(['patient.changed', 'patient.read']);
    expect(await actions(`patientId=${patient.id}`)).toEqual(['patient.changed', 'patient.read']);
    expect(await actions('action=patient.r')).toEqual(['patient.read']);
    // A wildcard of SQL is none here.
    await agent.get('/api/audit?action=%25').expect(422);
    await agent.get('/api/audit?cursor=abc').expect(422);
  });

  it('lists by days of a site, the first inclusive and the last exclusive', async () => {
    const { database } = house.context;
    const auckland = await buildSite(database, { timeZone: 'Pacific/Auckland' });
    // Midnight of December 2 in Auckland is 11:00 of December 1 in UTC.
    await inTransaction(database, async (tx) => {
      for (const at of [
        '2026-12-01T10:59:59.999Z',
        '2026-12-01T11:00:00Z',
        '2026-12-02T10:59:59Z',
        '2026-12-02T11:00:00Z',
      ]) {
        await recordAudit(tx, jobSource(new Date(at)), [
          { action: 'day.told', objectType: 'day', objectId: at },
        ]);
      }
    });
    const days = async (span: string) =>
      (await read(`action=day.told&siteId=${auckland.id}&${span}`)).items.map(
        ({ objectId }) => objectId,
      );
    expect(await days('from=2026-12-02&to=2026-12-03')).toEqual([
      '2026-12-02T10:59:59Z',
      '2026-12-01T11:00:00Z',
    ]);
    expect(await days('to=2026-12-02')).toEqual(['2026-12-01T10:59:59.999Z']);
    expect(await days('from=2026-12-03')).toEqual(['2026-12-02T11:00:00Z']);
    await agent.get('/api/audit?from=2026-12-02').expect(422);
    await agent.get(`/api/audit?siteId=${auckland.id}&from=2026-12-02&to=2026-12-02`).expect(422);
    await agent.get(`/api/audit?siteId=${nurse.id}&from=2026-12-02`).expect(422);
  });

  it('goes on page by page, each event once, the newest first', async () => {
    const ids: string[] = [];
    let cursor: string | null = null;
    do {
      const next: string = cursor ? `&cursor=${cursor}` : '';
      const page = await read(`limit=1&actorId=${nurse.id}${next}`);
      ids.push(...page.items.map(({ id }) => id));
      cursor = page.nextCursor;
    } while (cursor);
    expect(ids).toHaveLength(2);
    expect(new Set(ids).size).toBe(2);
  });

  it('is audited itself, with whose record was asked for', async () => {
    await read(`patientId=${patient.id}&action=patient.`);
    const [newest] = (await read('action=audit.')).items;
    expect(newest).toMatchObject({
      action: 'audit.read',
      patient: { id: patient.id },
      details: { action: 'patient.' },
    });
  });
});
