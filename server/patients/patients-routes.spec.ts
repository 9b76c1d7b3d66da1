import { describe, expect, it } from 'vitest';
import type { Role } from '@shared/contracts/accounts-contract';
import { agentFor } from '../../test/builders/agent';
import { pageOf, patientsHouse } from '../../test/builders/patients-house';
import { buildPatientWithAccount, buildSite } from '../../test/builders/people';
import { buildPrescription } from '../../test/builders/prescriptions';
import { buildEnrollment } from '../../test/builders/schedule';

const house = patientsHouse();
const { at, patient } = house;

describe('who sees what', () => {
  it('keeps sites apart, in the list and on the page', async () => {
    const other = await buildSite(house.testApp.context.database);
    const { id } = await patient({ siteId: other.id });
    expect((await pageOf(house.nurse, {})).items).toEqual([]);
    for (const path of ['', '/record', '/vital-signs']) {
      await house.nurse.get(`/api/patients/${id}${path}`).expect(404);
    }
    await house.nurse.patch(`/api/patients/${id}`).send({ version: 1, phone: '1' }).expect(404);
  });

  it('lets a patient read the own record alone, without the chart', async () => {
    const { user, patient: own } = await buildPatientWithAccount(house.testApp.context.database, {
      siteId: house.siteId,
    });
    await buildEnrollment(house.testApp.context.database, {
      patientId: own.id,
      siteId: house.siteId,
    });
    const agent = await agentFor(house.testApp, user);
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
    const { id: enrollmentId } = await buildEnrollment(house.testApp.context.database, {
      patientId: id,
      siteId: house.siteId,
    });
    await buildPrescription(house.testApp.context.database, { patientId: id, enrollmentId });
    const agent = await at([role], [house.siteId]);
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
    const enrollment = await buildEnrollment(house.testApp.context.database, {
      patientId: id,
      siteId: house.siteId,
    });
    return { patientId: id, enrollmentId: enrollment.id };
  };
  const flagsOf = async () => (await pageOf(house.nurse, {})).items[0]?.flags;

  it('no course', async () => {
    await patient();
    expect(await flagsOf()).toEqual(['no-course']);
  });

  it('no range', async () => {
    await setUp();
    expect(await flagsOf()).toEqual(['no-range']);
  });

  it('a draft waits for a physician', async () => {
    await buildPrescription(house.testApp.context.database, {
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
    await buildPrescription(house.testApp.context.database, { ...course, activatedAt });
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
      await buildPrescription(house.testApp.context.database, course);
      const path = `/api/patients/${course.patientId}/record/${kind}`;
      const entered = await house.nurse.post(path).send(values).expect(201);
      const [item] = (await pageOf(house.nurse, {})).items;
      expect(item?.flags).toEqual(['range-withdrawn']);
      expect(item?.range).toMatchObject({
        leadBy: 'perceived-exertion',
        target: null,
        ceiling: 108,
      });
      await house.nurse.post(`${path}/${entered.body.id}/entered-in-error`).expect(200);
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
    await buildPrescription(house.testApp.context.database, course);
    await house.nurse
      .post(`/api/patients/${course.patientId}/record/${kind}`)
      .send(values)
      .expect(201);
    expect(await flagsOf()).toEqual([]);
  });
});
