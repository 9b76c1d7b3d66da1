import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import pg from 'pg';
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Role } from '@shared/contracts/accounts-contract';
import type { PatientListItem, PatientSearchResponse } from '@shared/contracts/patients-contract';
import { agentFor, type Agent } from '../../test/builders/agent';
import {
  buildPatient,
  buildPatientWithAccount,
  buildSite,
  buildUser,
} from '../../test/builders/people';
import { buildPrescription } from '../../test/builders/prescriptions';
import { buildEnrollment } from '../../test/builders/schedule';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;
let siteId: string;
let nurse: Agent;

const at = (roles: readonly Role[], siteIds: readonly string[]) =>
  buildUser(house.context.database, { roles, siteIds }).then((user) => agentFor(house, user));

async function pageOf(agent: Agent, body: object): Promise<PatientSearchResponse> {
  const reply = await agent.post('/api/patients/search').send(body).expect(200);
  return reply.body as PatientSearchResponse;
}

async function allPages(
  agent: Agent,
  body: object,
  between: () => Promise<unknown> = () => Promise.resolve(),
): Promise<PatientListItem[]> {
  const items: PatientListItem[] = [];
  let cursor: string | null = null;
  do {
    const page: PatientSearchResponse = await pageOf(agent, { ...body, cursor });
    items.push(...page.items);
    cursor = page.nextCursor;
    await between();
  } while (cursor !== null);
  return items;
}

beforeAll(async () => {
  house = await createTestApp();
});
afterAll(() => house.close());

beforeEach(async () => {
  siteId = (await buildSite(house.context.database)).id;
  nurse = await at(['nurse'], [siteId]);
});

const patient = (given: Partial<Parameters<typeof buildPatient>[1]> = {}) =>
  buildPatient(house.context.database, { siteId, ...given });

describe('search', () => {
  it.each([
    ['verne'],
    ['VER'],
    ['oda'],
    ['ver oda'],
    ['Verne, Odalys'],
    ['lúcia'],
    ['lucia'],
    ['verne 1961'],
    ['verne 5/14/1961'],
    ['1961-05-14'],
    ['QY-10'],
    ['qy104'],
    ['104'],
  ])('%s finds Odalys Lúcia Verne', async (q) => {
    await patient({ familyName: 'Sørensen', givenName: 'Per', birthDate: '1950-01-02' });
    const { id } = await patient({
      familyName: 'Verne',
      givenName: 'Odalys Lúcia',
      birthDate: '1961-05-14',
      recordNumber: `QY-104${randomUUID().slice(0, 4)}`,
    });
    expect((await pageOf(nurse, { q })).items.map((item) => item.id)).toEqual([id]);
  });

  it.each([['rne'], ['verne x'], ['verne 1962'], ['###'], ["' or 1=1 --"], ['(a+)+$'], ['%']])(
    '%s does not',
    async (q) => {
      await patient({
        familyName: 'Verne',
        givenName: 'Odalys',
        birthDate: '1961-05-14',
        recordNumber: `Z${randomUUID().replaceAll('-', '')}`,
      });
      expect((await pageOf(nurse, { q })).items).toEqual([]);
    },
  );

  it.each([
    ["O'Brien", 'obrien'],
    ["O'Brien", "o'bri"],
    ["O'Brien", 'brien'],
    ['van den Berg', 'vandenberg'],
    ['van den Berg', 'berg'],
    ['Łukasik', 'luk'],
    ['Sørensen', 'sorensen'],
    ['Smith-Jones', 'jones'],
    ['Smith-Jones', 'smithjones'],
  ])('finds %s by %s', async (familyName, q) => {
    await patient({ familyName });
    expect((await pageOf(nurse, { q })).items).toHaveLength(1);
  });

  it('tells what a person needs in a list', async () => {
    const { id, recordNumber } = await patient({ familyName: 'Verne', givenName: 'Odalys' });
    const enrollment = await buildEnrollment(house.context.database, {
      patientId: id,
      siteId,
      plannedSessions: 24,
    });
    await buildPrescription(house.context.database, { patientId: id, enrollmentId: enrollment.id });
    const { items } = await pageOf(nurse, {});
    expect(items).toEqual([
      {
        id,
        displayName: 'Odalys Verne',
        familyName: 'Verne',
        givenName: 'Odalys',
        recordNumber,
        birthDate: '1961-04-17',
        ageYears: 65,
        site: { id: siteId, name: expect.any(String), timeZone: 'America/New_York' },
        course: { enrollmentId: enrollment.id, status: 'active', attended: 0, planned: 24 },
        range: {
          prescriptionId: expect.any(String),
          leadBy: 'heart-rate',
          target: { lower: 91, upper: 108 },
          ceiling: 108,
          perceivedExertion: { lower: 11, upper: 14 },
          since: expect.any(String),
        },
        flags: [],
      },
    ]);
  });

  it('shows the running course before an older or a later ended one', async () => {
    const { id } = await patient();
    const build = (given: Partial<Parameters<typeof buildEnrollment>[1]>) =>
      buildEnrollment(house.context.database, { patientId: id, siteId, ...given });
    await build({ status: 'completed', enrolledOn: '2025-01-01' });
    const running = await build({ enrolledOn: '2026-03-01' });
    await build({ status: 'discontinued', enrolledOn: '2026-05-01' });
    const { items } = await pageOf(nurse, {});
    expect(items[0]?.course?.enrollmentId).toBe(running.id);
  });

  it.each([
    [{ limit: 0 }, 'limit'],
    [{ limit: 101 }, 'limit'],
    [{ limit: '5' }, 'limit'],
    [{ cursor: 'bm9uc2Vuc2U' }, 'cursor'],
    [{ cursor: Buffer.from('["a\\u0000","b","c"]').toString('base64url') }, 'cursor'],
    [{ q: 'x'.repeat(101) }, 'q'],
    [{ name: 'Verne' }, 'name'],
  ])('refuses %j', async (body, path) => {
    const reply = await nurse.post('/api/patients/search').send(body).expect(422);
    expect(reply.body.errors).toMatchObject([{ path }]);
  });

  it('refuses a NUL in a query without breaking', async () => {
    await nurse.post('/api/patients/search').send({ q: 'a\u0000b' }).expect(422);
  });

  it.each<[Role, number]>([
    ['patient', 403],
    ['nurse', 200],
    ['exercise-physiologist', 200],
    ['physician', 200],
    ['front-desk', 200],
    ['director', 200],
    ['administrator', 200],
  ])('a %s gets %i', async (role, status) => {
    const agent = await at([role], [siteId]);
    await agent.post('/api/patients/search').send({}).expect(status);
  });

  it('records who looked and whom it showed, and no name', async () => {
    const { id } = await patient({ familyName: 'Verne' });
    await pageOf(nurse, { q: 'Verne' });
    const { rows } = await house.context.database.$client.query<{ details: unknown }>(
      `SELECT details FROM audit_events WHERE action = 'patients.searched' ORDER BY sequence DESC LIMIT 1`,
    );
    expect(rows[0]?.details).toEqual({ shown: [id] });
  });
});

describe('paging', () => {
  it('gives every patient once, in the order of people’s names, also equal ones', async () => {
    const names = fc.constantFrom('Öz', 'Oz', 'oz', 'Ö z', 'Zed', 'Ab', 'áb', 'Ab-c', 'É');
    await fc.assert(
      fc.asyncProperty(
        fc.array(fc.tuple(names, names), { minLength: 0, maxLength: 14 }),
        fc.integer({ min: 1, max: 5 }),
        async (people, limit) => {
          const site = await buildSite(house.context.database);
          for (const [familyName, givenName] of people) {
            await patient({ siteId: site.id, familyName, givenName });
          }
          const agent = await at(['nurse'], [site.id]);
          const listed = await allPages(agent, { limit });
          const { rows } = await house.context.database.$client.query<{ id: string }>(
            'SELECT id FROM patients WHERE site_id = $1 ORDER BY family_name, given_name, id',
            [site.id],
          );
          expect(listed.map(({ id }) => id)).toEqual(rows.map(({ id }) => id));
        },
      ),
      { numRuns: 8 },
    );
  });

  it('keeps its place while patients are added, each earlier one shown once', async () => {
    const before = await Promise.all(
      Array.from({ length: 9 }, (_, each) => patient({ familyName: `F${each % 3}` })),
    );
    let added = 0;
    const listed = await allPages(nurse, { limit: 2 }, () => {
      added += 1;
      return added > 6 ? Promise.resolve() : patient({ familyName: `F${added % 4}` });
    });
    const ids = listed.map(({ id }) => id);
    expect(new Set(ids).size).toBe(ids.length);
    expect(ids).toEqual(expect.arrayContaining(before.map(({ id }) => id)));
    const names = listed.map(({ familyName }) => familyName);
    expect(names).toEqual([...names].sort());
  });

  it('takes as many statements for many as for one', async () => {
    const statements = async (limit: number) => {
      const spy = vi.spyOn(pg.Client.prototype, 'query');
      await pageOf(nurse, { limit });
      const count = spy.mock.calls.length;
      spy.mockRestore();
      return count;
    };
    for (let each = 0; each < 30; each += 1) await patient();
    await statements(1);
    const [one, many] = [await statements(1), await statements(30)];
    expect(many).toBe(one);
  });
});

describe('who sees what', () => {
  it('keeps sites apart, in the list and on the page', async () => {
    const other = await buildSite(house.context.database);
    const { id } = await patient({ siteId: other.id });
    expect((await pageOf(nurse, {})).items).toEqual([]);
    for (const path of ['', '/record', '/vital-signs']) {
      await nurse.get(`/api/patients/${id}${path}`).expect(404);
    }
    await nurse.patch(`/api/patients/${id}`).send({ version: 1, phone: '1' }).expect(404);
  });

  it('lets a patient read the own record alone, without the chart', async () => {
    const { user, patient: own } = await buildPatientWithAccount(house.context.database, {
      siteId,
    });
    await buildEnrollment(house.context.database, { patientId: own.id, siteId });
    const agent = await agentFor(house, user);
    const reply = await agent.get(`/api/patients/${own.id}`).expect(200);
    expect(reply.body).toMatchObject({ id: own.id, clinical: null, account: 'invited' });
    expect(reply.body.enrollments).toMatchObject([{ number: 1, qualifying: null }]);
    await agent.get(`/api/patients/${(await patient()).id}`).expect(404);
    await agent.get(`/api/patients/${own.id}/record`).expect(403);
  });

  it.each<[Role, boolean]>([
    ['nurse', true],
    ['exercise-physiologist', true],
    ['physician', true],
    ['front-desk', false],
    ['director', false],
    ['administrator', false],
  ])('a %s reads the chart: %s', async (role, readsChart) => {
    const { id } = await patient();
    const { id: enrollmentId } = await buildEnrollment(house.context.database, {
      patientId: id,
      siteId,
    });
    await buildPrescription(house.context.database, { patientId: id, enrollmentId });
    const agent = await at([role], [siteId]);
    const head = await agent.get(`/api/patients/${id}`).expect(200);
    const [listed] = (await pageOf(agent, {})).items;
    expect(head.body.clinical !== null).toBe(readsChart);
    expect(head.body.enrollments[0].qualifying !== null).toBe(readsChart);
    expect(listed?.range !== null).toBe(readsChart);
    await agent.get(`/api/patients/${id}/record`).expect(readsChart ? 200 : 403);
    await agent.get(`/api/patients/${id}/vital-signs`).expect(readsChart ? 200 : 403);
    if (!readsChart) expect(JSON.stringify(head.body)).not.toMatch(/heart-attack|:108\b|moderate/);
  });
});

describe('flags', () => {
  const setUp = async () => {
    const { id } = await patient();
    const enrollment = await buildEnrollment(house.context.database, { patientId: id, siteId });
    return { patientId: id, enrollmentId: enrollment.id };
  };
  const flagsOf = async () => (await pageOf(nurse, {})).items[0]?.flags;

  it('no course', async () => {
    await patient();
    expect(await flagsOf()).toEqual(['no-course']);
  });

  it('no range', async () => {
    await setUp();
    expect(await flagsOf()).toEqual(['no-range']);
  });

  it('a draft waits for a physician', async () => {
    await buildPrescription(house.context.database, {
      ...(await setUp()),
      status: 'draft',
      awaiting: 'physician',
      activatedAt: null,
    });
    expect(await flagsOf()).toEqual(['awaiting-physician', 'no-range']);
  });

  it('review due after the policy’s days', async () => {
    const course = await setUp();
    const activatedAt = new Date('2026-10-31T15:00:00Z');
    await buildPrescription(house.context.database, { ...course, activatedAt });
    expect(await flagsOf()).toEqual(['review-due']);
  });

  it.each([
    [
      'medications',
      {
        name: 'x',
        rateActing: 'ivabradine',
        dose: '5 mg',
        schedule: 'daily',
        startedOn: '2026-11-30',
      },
    ],
    ['rhythms', { rhythm: 'atrial-fibrillation', observedOn: '2026-12-01' }],
    [
      'devices',
      { icdStatus: 'present', icdZones: [{ rate: 170, kind: 'shock' }], checkedOn: '2026-12-01' },
    ],
    ['thresholds', { kind: 'angina', heartRate: 100, foundOn: '2026-12-01' }],
    ['clinical-events', { kind: 'syncope', description: 'at home', occurredOn: '2026-11-30' }],
  ])(
    '%s entered since withdraws the range: effort leads, the ceiling stays',
    async (kind, values) => {
      const course = await setUp();
      await buildPrescription(house.context.database, course);
      const path = `/api/patients/${course.patientId}/record/${kind}`;
      const entered = await nurse.post(path).send(values).expect(201);
      const [item] = (await pageOf(nurse, {})).items;
      expect(item?.flags).toEqual(['range-withdrawn']);
      expect(item?.range).toMatchObject({
        leadBy: 'perceived-exertion',
        target: null,
        ceiling: 108,
      });
      await nurse.post(`${path}/${entered.body.id}/entered-in-error`).expect(200);
      expect(await flagsOf()).toEqual([]);
    },
  );

  it.each([
    [
      'medications',
      { name: 'atorvastatin', dose: '40 mg', schedule: 'daily', startedOn: '2026-11-30' },
    ],
    ['rhythms', { rhythm: 'sinus', observedOn: '2026-12-01' }],
    ['devices', { icdStatus: 'none', checkedOn: '2026-12-01' }],
    ['resting-rates', { seated: 70, measuredOn: '2026-12-01' }],
  ])('%s that change nothing do not', async (kind, values) => {
    const course = await setUp();
    await buildPrescription(house.context.database, course);
    await nurse.post(`/api/patients/${course.patientId}/record/${kind}`).send(values).expect(201);
    expect(await flagsOf()).toEqual([]);
  });
});
