import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { MyProgress } from '@shared/contracts/my-progress-contract';
import { agentFor } from '../../test/builders/agent';
import { readingBody, recordBody } from '../../test/builders/floor';
import { buildFloorWorld, type FloorWorld } from '../../test/builders/floor-world';
import { buildPatientWithAccount, buildUser } from '../../test/builders/people';
import { buildBooker, buildClassDate, buildEnrollment } from '../../test/builders/schedule';

let world: FloorWorld;
beforeAll(async () => {
  world = await buildFloorWorld();
});
afterAll(() => world.close());

/** The patient’s own browser, the account made where there was none. */
async function ownOf(patientId: string) {
  const user = await buildUser(world.house.context.database, { roles: ['patient'] });
  await world.sql('UPDATE patients SET user_id = $2 WHERE id = $1', [patientId, user.id]);
  return agentFor(world.house, user);
}

const read = async (agent: Awaited<ReturnType<typeof agentFor>>) =>
  (await agent.get('/api/my/progress').expect(200)).body as MyProgress;

/** A further appointment of the patient’s course, as it ended. */
async function another(
  patient: { readonly id: string; readonly enrollmentId: string },
  given: { on: string; status: string; exercised?: boolean; kind?: 'exercise' | 'education' },
) {
  const { kind = 'exercise', on } = given;
  const date = await buildClassDate(world.house.context.database, world.site, {
    localDate: on,
    kind,
  });
  await world.sql(
    `INSERT INTO appointments (id, class_date_id, patient_id, enrollment_id, status, exercised, monitored, local_date,
                               starts_at, ends_at, created_by)
     SELECT $1, $2, $3, $4, $5, $6, false, $7, $8, $9, u.id FROM users u LIMIT 1`,
    [
      uuidv7(),
      date.id,
      patient.id,
      patient.enrollmentId,
      given.status,
      given.exercised ?? true,
      on,
      date.startsAt,
      date.endsAt,
    ],
  );
}

async function walked(patientId: string, performedOn: string, meters: number, struckOut = false) {
  await world.sql(
    `INSERT INTO walk_tests (id, patient_id, distance_meters, performed_on, recorded_by, entered_in_error_at, entered_in_error_by)
     SELECT $1, $2, $3, $4, u.id, CASE WHEN $5 THEN now() END, CASE WHEN $5 THEN u.id END FROM users u LIMIT 1`,
    [uuidv7(), patientId, meters, performedOn, struckOut],
  );
}

describe('GET /api/my/progress', () => {
  it('tells each attended session by its own readings, against the range of that day', async () => {
    const { recordId, patient } = await world.begun();
    const wrong = uuidv7();
    const readings = [
      [uuidv7(), { phase: 'resting', heartRate: 60, measuredAt: '2026-12-01T14:01:00.000Z' }],
      [wrong, { heartRate: 190, perceivedExertion: 20 }],
      [uuidv7(), { heartRate: 97, perceivedExertion: 13 }],
    ] as const;
    for (const [id, given] of readings) {
      await world.put(id, readingBody(recordId, given)).expect(201);
    }
    const mended = { id: uuidv7(), reason: 'Digits swapped', heartRate: 92, perceivedExertion: 12 };
    await world.nurse.post(`/api/vital-signs/${wrong}/amendments`).send(mended).expect(201);
    const own = await ownOf(patient.id);
    expect((await read(own)).course).toMatchObject({ done: 0, sessions: [], booked: 0 });
    await world.sign(recordId).expect(200);
    const { site, course } = await read(own);
    expect(site).toEqual({ name: world.site.name, phone: world.site.phone });
    expect(course).toMatchObject({ status: 'active', planned: 36, done: 1 });
    // (92 + 97) / 2 and (12 + 13) / 2, rounded half away from zero.
    expect(course?.sessions).toEqual([
      { localDate: '2026-12-01', heartRate: 95, effort: 13, target: { lower: 91, upper: 105 } },
    ]);
  });

  it('counts what the course counts, and shows nothing that was not recorded', async () => {
    const { patient } = await world.visit({ range: false });
    const own = await ownOf(patient.id);
    const course = { id: patient.id, enrollmentId: patient.enrollmentId };
    await another(course, { on: '2026-11-25', status: 'fulfilled' });
    await another(course, { on: '2026-11-20', status: 'fulfilled' });
    await another(course, { on: '2026-11-21', status: 'fulfilled', exercised: false });
    await another(course, { on: '2026-11-22', status: 'noshow' });
    await another(course, { on: '2026-11-23', status: 'fulfilled', kind: 'education' });
    await another(course, { on: '2026-12-08', status: 'booked' });
    await another(course, { on: '2026-12-09', status: 'cancelled' });
    await another(course, { on: '2026-12-10', status: 'booked', kind: 'education' });
    const told = (await read(own)).course;
    const nothing = { heartRate: null, effort: null, target: null };
    expect(told?.sessions).toEqual([
      { localDate: '2026-11-20', ...nothing },
      { localDate: '2026-11-25', ...nothing },
    ]);
    // Today’s class is over and not signed yet: neither done nor to come.
    expect([told?.done, told?.booked]).toEqual([2, 1]);
    expect(told?.walks).toBeNull();
  });

  it('leaves out the range of a day on which effort led', async () => {
    const { patient, appointment } = await world.visit();
    const by = await buildUser(world.house.context.database, { roles: ['nurse'] });
    await world.sql(
      `INSERT INTO clinical_events (id, patient_id, kind, description, occurred_on, recorded_at, recorded_by)
       VALUES ($1, $2, 'hospital-stay', 'Heart failure', '2026-11-28', '2026-11-29T10:00:00Z', $3)`,
      [uuidv7(), patient.id, by.id],
    );
    const recordId = uuidv7();
    const begun = world.nurse.put(`/api/session-records/${recordId}`);
    await begun.send(recordBody(appointment.id)).expect(201);
    await world.put(uuidv7(), readingBody(recordId, { perceivedExertion: 12 })).expect(201);
    await world.sign(recordId).expect(200);
    const { course } = await read(await ownOf(patient.id));
    expect(course?.sessions).toMatchObject([{ heartRate: 100, effort: 12, target: null }]);
  });

  it('holds the latest walk beside the first since the event, struck out ones aside', async () => {
    const { patient } = await world.visit();
    const own = await ownOf(patient.id);
    await walked(patient.id, '2025-03-01', 500);
    await walked(patient.id, '2026-11-02', 310);
    await walked(patient.id, '2026-11-03', 900, true);
    const first = { performedOn: '2026-11-02', distanceMeters: 310 };
    expect((await read(own)).course?.walks).toEqual({ first, latest: first });
    await walked(patient.id, '2026-11-28', 372.5);
    const latest = { performedOn: '2026-11-28', distanceMeters: 372.5 };
    expect((await read(own)).course?.walks).toEqual({ first, latest });
  });

  it('tells of the course that runs, else of the latest, else of none', async () => {
    const { database } = world.house.context;
    const { user, patient } = await buildPatientWithAccount(database, { siteId: world.site.id });
    const own = await agentFor(world.house, user);
    expect((await read(own)).course).toBeNull();
    const ended = { patientId: patient.id, siteId: world.site.id, enrolledOn: '2026-02-01' };
    await buildEnrollment(database, {
      ...ended,
      status: 'completed',
      closedOn: '2026-07-01',
      plannedSessions: 24,
    });
    expect((await read(own)).course).toMatchObject({ status: 'completed', closedOn: '2026-07-01' });
    await buildEnrollment(database, { ...ended, enrolledOn: '2026-01-01', plannedSessions: 18 });
    expect((await read(own)).course).toMatchObject({ status: 'active', planned: 18 });
  });

  it('is the own record alone, and its reading is on the record', async () => {
    const { database } = world.house.context;
    const [mine, others] = [
      await buildBooker(database, world.site, { plannedSessions: 20 }),
      await buildBooker(database, world.site, { plannedSessions: 30 }),
    ];
    const own = await agentFor(world.house, mine.user);
    const asked = await own.get(`/api/my/progress?patientId=${others.patient.id}`);
    expect(asked.status).toBe(422);
    expect((await read(own)).course?.planned).toBe(20);
    const { rows } = await world.sql(
      `SELECT patient_id FROM audit_events WHERE action = 'my-progress.read' AND actor_id = $1`,
      [mine.user.id],
    );
    expect(rows).toEqual([{ patient_id: mine.patient.id }]);
    const unlinked = await buildUser(database, { roles: ['patient'] });
    await (await agentFor(world.house, unlinked)).get('/api/my/progress').expect(404);
    await world.nurse.get('/api/my/progress').expect(403);
  });
});
