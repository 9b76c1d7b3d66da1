import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Roster } from '@shared/contracts/floor-contract';
import type { PrescribingTasks } from '@shared/contracts/prescriptions-waiting-contract';
import type { CourseSoFar, Proposal } from '@shared/contracts/progression-contract';
import { agentFor } from '../../test/builders/agent';
import { boutBody, buildAppointment, readingBody, recordBody } from '../../test/builders/floor';
import { buildFloorWorld, type FloorWorld } from '../../test/builders/floor-world';
import { buildStaff } from '../../test/builders/prescribing';
import { buildClassDate } from '../../test/builders/schedule';

let world: FloorWorld;
beforeAll(async () => {
  world = await buildFloorWorld();
});
afterAll(() => world.close());

type Begun = Awaited<ReturnType<FloorWorld['begun']>>;

/** Writes work and readings of a visit and signs it. */
async function session({ recordId }: { recordId: string }, work: object | null = {}, rate = 99) {
  if (work) {
    const body = boutBody(recordId, work);
    await world.nurse.put(`/api/exercise-bouts/${uuidv7()}`).send(body).expect(201);
  }
  for (let count = 0; count < 2; count += 1) {
    const reading = { heartRate: rate, perceivedExertion: 12, symptoms: ['none'] };
    await world.put(uuidv7(), readingBody(recordId, reading)).expect(201);
  }
  await world.sign(recordId).expect(200);
}

/** The same patient in a class of another day, checked in, with the record begun. */
async function again({ patient }: Begun, localDate: string) {
  const classDate = await buildClassDate(world.house.context.database, world.site, { localDate });
  const appointment = await buildAppointment(world.house.context.database, {
    classDate,
    patientId: patient.id,
    enrollmentId: patient.enrollmentId,
    status: 'checked-in',
  });
  const recordId = uuidv7();
  const body = recordBody(appointment.id, `${localDate}T14:00:00.000Z`);
  await world.nurse.put(`/api/session-records/${recordId}`).send(body).expect(201);
  return { recordId, classDate, appointment };
}

const course = async ({ patient }: Begun) => {
  const path = `/api/patients/${patient.id}/course-so-far`;
  return (await world.nurse.get(path).expect(200)).body as CourseSoFar;
};
const physiologist = async () =>
  (await buildStaff(world.house, world.site.id, 'exercise-physiologist')).agent;
const startOf = async (classDateId: string) => {
  const { body } = await world.nurse.get(`/api/class-dates/${classDateId}/roster`).expect(200);
  return (body as Roster).items[0]?.nextStart;
};

/** Two clean sessions at 2.8 mph for half an hour: harder, 3.0 mph. */
async function twoSessions() {
  const first = await world.begun();
  await session(first);
  world.house.clock.advance(1000);
  await session(await again(first, '2026-12-03'));
  const { proposal } = await course(first);
  return { first, proposal: proposal as Proposal };
}

describe('after a session is signed', () => {
  it('the next step is worked out and kept once, with its reasons and versions', async () => {
    const first = await world.begun();
    await session(first);
    const { proposal, sessions } = await course(first);
    expect(proposal).toMatchObject({
      sessionRecordId: first.recordId,
      action: 'hold',
      reasons: [{ code: 'few-sessions' }],
      from: {
        setting: { modality: 'treadmill-walk', speedMph: 2.8, gradePercent: 0 },
        minutes: 30,
      },
      to: null,
      policyVersion: 1,
      engineVersion: '1.0.0',
      decision: null,
      stands: true,
    });
    expect(sessions).toMatchObject([
      {
        medianHeartRate: 99,
        highestHeartRate: 99,
        medianExertion: 12,
        load: { minutes: 30 },
        target: { lower: 91, upper: 108 },
        ceiling: 108,
        exertion: { lower: 11, upper: 14 },
      },
    ]);
    expect(sessions[0]?.load?.mets).toBeCloseTo(3.1458, 3);
    await world.sign(first.recordId).expect(200);
    const { rows } = await world.sql(
      'SELECT count(*)::int AS count FROM progression_proposals WHERE patient_id = $1',
      [first.patient.id],
    );
    expect(rows).toEqual([{ count: 1 }]);
  });

  it('without work, or without a range, nothing is raised', async () => {
    const idle = await world.begun();
    await session(idle, null);
    expect((await course(idle)).proposal).toMatchObject({
      action: 'hold',
      reasons: [{ code: 'not-recorded' }],
      from: null,
    });
    const free = await world.begun({ range: false });
    await session(free);
    expect((await course(free)).proposal).toBeNull();
  });

  it('an accepted step is what the next session starts with', async () => {
    const { first, proposal } = await twoSessions();
    expect(proposal).toMatchObject({
      action: 'harder',
      to: { setting: { speedMph: 3, gradePercent: 0 }, minutes: 30 },
    });
    const next = await again(first, '2026-12-05');
    expect(await startOf(next.classDate.id)).toMatchObject({
      from: 'last-session',
      load: { setting: { speedMph: 2.8 } },
    });
    const path = `/api/progression-proposals/${proposal.id}/decision`;
    const agent = await physiologist();
    await agent.post(path).send({ decision: 'accepted' }).expect(200);
    expect(await startOf(next.classDate.id)).toMatchObject({
      from: 'accepted',
      load: { setting: { speedMph: 3 } },
    });
    const twice = await agent.post(path).send({ decision: 'dismissed', reason: 'Tired' });
    expect(twice.body.code).toBe('stale-version');
    expect(await world.auditOf(proposal.id)).toEqual(['progression.accepted']);
  });

  it('is edited under the ceilings alone, and dismissed with a reason', async () => {
    const { first, proposal } = await twoSessions();
    const path = `/api/progression-proposals/${proposal.id}/decision`;
    const agent = await physiologist();
    const edit = (speedMph: number, gradePercent: number) =>
      agent.post(path).send({
        decision: 'edited',
        setting: { modality: 'treadmill-walk', speedMph, gradePercent },
        minutes: 25,
        reason: 'Knee',
      });
    const over = await edit(3, 5).expect(422);
    expect(over.body.errors).toMatchObject([{ path: 'setting', code: 'over-ceiling' }]);
    expect((await edit(1, 0).expect(422)).body.errors).toMatchObject([{ code: 'equation-range' }]);
    await agent.post(path).send({ decision: 'dismissed' }).expect(422);
    const { body } = await edit(2.9, 0).expect(200);
    expect(body).toMatchObject({
      decision: { kind: 'edited', reason: 'Knee', load: { minutes: 25 } },
    });
    const next = await again(first, '2026-12-05');
    expect(await startOf(next.classDate.id)).toMatchObject({
      from: 'edited',
      load: { setting: { speedMph: 2.9 } },
    });
  });

  it('does not stand once the range is withdrawn, and what was accepted counts no more', async () => {
    const { first, proposal } = await twoSessions();
    const agent = await physiologist();
    const path = `/api/progression-proposals/${proposal.id}/decision`;
    const fainted = { kind: 'syncope', description: 'At home', occurredOn: '2026-12-01' };
    await world.nurse
      .post(`/api/patients/${first.patient.id}/record/clinical-events`)
      .send(fainted)
      .expect(201);
    expect((await course(first)).proposal?.stands).toBe(false);
    expect((await agent.post(path).send({ decision: 'accepted' })).body.code).toBe('stale-version');
    await agent.post(path).send({ decision: 'dismissed', reason: 'Fainted' }).expect(200);
    const next = await again(first, '2026-12-05');
    expect(await startOf(next.classDate.id)).toMatchObject({ from: 'last-session' });
    const third = await agentFor(world.house, await nobody());
    await third.get(`/api/patients/${first.patient.id}/course-so-far`).expect(404);
  });
});

describe('PUT /api/exercise-bouts/:id', () => {
  it('is idempotent, never overwrites, and stops at the signature', async () => {
    const visit = await world.begun();
    const id = uuidv7();
    const put = (given: object = {}) =>
      world.nurse.put(`/api/exercise-bouts/${id}`).send(boutBody(visit.recordId, given));
    await put().expect(201);
    await put().expect(200);
    expect((await put({ minutes: 20 }).expect(409)).body.code).toBe('already-recorded');
    const later = boutBody(visit.recordId, { setting: { modality: 'cycle', powerWatts: 60 } });
    world.house.clock.advance(1000);
    await world.nurse.put(`/api/exercise-bouts/${uuidv7()}`).send(later).expect(201);
    const { body } = await world.nurse
      .get(`/api/class-dates/${visit.classDate.id}/roster`)
      .expect(200);
    expect((body as Roster).items[0]?.work?.setting).toEqual({ modality: 'cycle', powerWatts: 60 });
    await world.sign(visit.recordId, { exercised: true }).expect(200);
    const late = await world.nurse.put(`/api/exercise-bouts/${uuidv7()}`).send(later);
    expect(late.body.code).toBe('record-signed');
  });
});

describe('what a physiologist sees to', () => {
  const tasksOf = async (patientId: string) => {
    const agent = await physiologist();
    const { body } = await agent.get('/api/prescriptions/tasks').expect(200);
    return (body as PrescribingTasks).groups.flatMap(({ kind, items }) =>
      items.filter(({ patient }) => patient.id === patientId).map(({ step }) => [kind, step]),
    );
  };

  it('holds next steps, sessions out of range and records that nobody signed', async () => {
    const { first } = await twoSessions();
    expect(await tasksOf(first.patient.id)).toEqual([['next-step', 'harder']]);
    const fast = await world.begun();
    await session(fast, {}, 115);
    world.house.clock.advance(1000);
    await session(await again(fast, '2026-12-03'), {}, 115);
    expect(await tasksOf(fast.patient.id)).toEqual([
      ['ran-above', null],
      ['next-step', 'review'],
    ]);
    const slow = await world.begun();
    await session(slow, {}, 80);
    world.house.clock.advance(1000);
    await session(await again(slow, '2026-12-03'), {}, 80);
    expect(await tasksOf(slow.patient.id)).toContainEqual(['ran-below', null]);
    const open = await world.begun();
    expect(await tasksOf(open.patient.id)).toEqual([['record-unsigned', null]]);
  });

  it('asks for a new range, and for no step under the one that is withdrawn', async () => {
    const { first } = await twoSessions();
    await world.nurse
      .post(`/api/patients/${first.patient.id}/record/clinical-events`)
      .send({ kind: 'syncope', description: 'At home', occurredOn: '2026-12-01' })
      .expect(201);
    expect(await tasksOf(first.patient.id)).toEqual([['withdrawn', null]]);
  });
});

async function nobody() {
  const { buildSite, buildUser } = await import('../../test/builders/people');
  const { database } = world.house.context;
  const site = await buildSite(database);
  return buildUser(database, { roles: ['nurse'], siteIds: [site.id] });
}
