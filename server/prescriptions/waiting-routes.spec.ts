import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { taskKinds, type PrescribingTasks } from '@shared/contracts/prescriptions-waiting-contract';
import type { Worksheet } from '@shared/contracts/prescriptions-worksheet-contract';
import { buildCourse, buildPrescribers, draftOf, signOf } from '../../test/builders/prescribing';
import { prescriptionInput } from '../../test/builders/prescription-request';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;

beforeAll(async () => {
  house = await createTestApp();
});
afterAll(() => house.close());

type People = Awaited<ReturnType<typeof buildPrescribers>>;

const drug = {
  name: 'metoprolol tartrate',
  dose: '50 mg',
  schedule: 'twice a day',
  rateActing: 'beta-blocker',
  startedOn: '2026-11-30',
};

/** A drug that acts on the rate, entered a minute after all before. */
async function changeDrug({ nurse }: People, patientId: string) {
  house.clock.advance(60_000);
  await nurse.agent.post(`/api/patients/${patientId}/record/medications`).send(drug).expect(201);
}

async function inForce({ physician, physiologist }: People, patientId: string) {
  const draft = await draftOf(physiologist.agent, patientId);
  return (await signOf(physician.agent, draft).expect(200)).body as { id: string };
}

describe('GET /api/prescriptions/awaiting-signature', () => {
  const list = async ({ physician }: People) =>
    (await physician.agent.get('/api/prescriptions/awaiting-signature').expect(200)).body as {
      items: {
        id: string;
        version: number;
        causes: string[];
        outdated: string[];
        inForce: unknown;
      }[];
      total: number;
    };

  it('tells what a physician needs at a glance, the longest waiting first', async () => {
    const people = await buildPrescribers(house);
    const first = await buildCourse(house, people.site);
    const second = await buildCourse(house, people.site);
    const former = await inForce(people, second.patientId);
    const signed = [];
    for (const { patientId } of [first, second]) {
      house.clock.advance(1000);
      const draft = await draftOf(
        people.physiologist.agent,
        patientId,
        prescriptionInput((it) => (it.risk = 'high')),
      );
      signed.push((await signOf(people.physiologist.agent, draft).expect(200)).body);
    }
    const { items, total } = await list(people);
    expect(total).toBe(2);
    expect(items.map(({ id }) => id)).toEqual(signed.map(({ id }) => id as string));
    expect(items[0]).toMatchObject({
      version: 2,
      patient: { id: first.patientId, ageYears: 65, site: { id: people.site.id } },
      course: { status: 'active', attended: 0, planned: 36, diagnosis: 'heart-attack' },
      risk: 'high',
      result: { target: { lower: 91, upper: 108 }, ceiling: { value: 108 } },
      causes: ['first-range', 'risk'],
      outdated: [],
      signedBy: { id: people.physiologist.id },
      inForce: null,
    });
    expect(items[1]).toMatchObject({ causes: ['risk'], inForce: { prescriptionId: former.id } });
    await signOf(people.physician.agent, items[0] ?? { id: '', version: 0 }).expect(200);
    expect((await list(people)).items.map(({ id }) => id)).toEqual([signed[1].id]);
  });

  it('warns of what was entered since it was worked out', async () => {
    const people = await buildPrescribers(house);
    const { patientId } = await buildCourse(house, people.site);
    await signOf(people.physiologist.agent, await draftOf(people.physiologist.agent, patientId));
    await changeDrug(people, patientId);
    expect((await list(people)).items[0]?.outdated).toEqual(['drugs']);
  });

  it('is of the own sites alone', async () => {
    const [here, there] = [await buildPrescribers(house), await buildPrescribers(house)];
    const { patientId } = await buildCourse(house, here.site);
    await signOf(here.physiologist.agent, await draftOf(here.physiologist.agent, patientId));
    expect((await list(there)).items).toEqual([]);
  });
});

describe('GET /api/prescriptions/tasks', () => {
  const tasksOf = async ({ physiologist }: People) => {
    const { body } = await physiologist.agent.get('/api/prescriptions/tasks').expect(200);
    const { groups } = body as PrescribingTasks;
    expect(groups.every(({ total, items }) => total === items.length)).toBe(true);
    return Object.fromEntries(
      groups.map(({ kind, items }) => [kind, items.map(({ patient }) => patient.id)]),
    );
  };
  const nothing = Object.fromEntries(taskKinds.map((kind) => [kind, [] as string[]]));

  it('follows a patient from a course without a range to a review that is due', async () => {
    const people = await buildPrescribers(house);
    const { patientId } = await buildCourse(house, people.site);
    expect(await tasksOf(people)).toEqual({ ...nothing, 'without-range': [patientId] });
    const draft = await draftOf(people.physiologist.agent, patientId);
    expect(await tasksOf(people)).toEqual({ ...nothing, unsigned: [patientId] });
    const { body } = await signOf(people.physiologist.agent, draft).expect(200);
    expect(await tasksOf(people)).toEqual({ ...nothing, 'awaiting-physician': [patientId] });
    await signOf(people.physician.agent, body).expect(200);
    expect(await tasksOf(people)).toEqual(nothing);
    await changeDrug(people, patientId);
    expect(await tasksOf(people)).toEqual({ ...nothing, withdrawn: [patientId] });
  });

  it('is of the own sites alone', async () => {
    const [here, there] = [await buildPrescribers(house), await buildPrescribers(house)];
    await buildCourse(house, here.site);
    const { patientId } = await buildCourse(house, here.site);
    await draftOf(here.physiologist.agent, patientId);
    expect(await tasksOf(there)).toEqual(nothing);
  });

  it('finds ranges older than the policy’s days of review', async () => {
    const people = await buildPrescribers(house);
    const { patientId } = await buildCourse(house, people.site);
    const { id } = await inForce(people, patientId);
    await house.context.database.$client.query(
      `INSERT INTO prescriptions (id, patient_id, enrollment_id, status, inputs, result, policy_version, engine_version,
         created_at, created_by, signed_at, signed_by, activated_at)
       SELECT gen_random_uuid(), $2, $3, 'active', inputs, result, policy_version, engine_version,
         created_at - interval '31 days', created_by, signed_at, signed_by, activated_at - interval '31 days'
         FROM prescriptions WHERE id = $1`,
      [id, ...Object.values(await buildCourse(house, people.site))],
    );
    expect((await tasksOf(people))['review-due']).toHaveLength(1);
    expect((await tasksOf(people))['review-due']).not.toContain(patientId);
  });
});

describe('GET /api/patients/:id/worksheet', () => {
  it('has the record’s inputs, the policy and what decides who signs', async () => {
    const people = await buildPrescribers(house);
    const { patientId } = await buildCourse(house, people.site);
    const read = async () =>
      (await people.nurse.agent.get(`/api/patients/${patientId}/worksheet`).expect(200))
        .body as Worksheet;
    const before = await read();
    expect(before).toMatchObject({
      patient: { id: patientId, ageYears: 65 },
      course: { planned: 36, eventOn: '2026-10-20' },
      today: '2026-12-01',
      policy: { version: 1 },
      first: true,
      student: false,
      inForce: null,
      lastPeak: null,
    });
    expect(before.record.missing).toContain('resting.seated');
    const { id } = await inForce(people, patientId);
    await changeDrug(people, patientId);
    expect(await read()).toMatchObject({
      first: false,
      inForce: { prescriptionId: id, withdrawn: ['drugs'], reviewDue: false },
    });
  });
});
