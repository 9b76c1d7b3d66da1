import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { defaultPolicy } from '@shared/clinical/prescribing';
import {
  buildCourse,
  buildPrescribers,
  buildStaff,
  draftOf,
  signOf,
} from '../../test/builders/prescribing';
import {
  answerTo,
  prescriptionInput,
  workedExample,
} from '../../test/builders/prescription-request';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

let house: TestApp;
let people: Awaited<ReturnType<typeof buildPrescribers>>;
let patientId: string;
let enrollmentId: string;

beforeAll(async () => {
  house = await createTestApp();
  people = await buildPrescribers(house);
});
afterAll(() => house.close());
beforeEach(async () => {
  ({ patientId, enrollmentId } = await buildCourse(house, people.site));
});

const physiologist = () => people.physiologist.agent;
const physician = () => people.physician.agent;
const draft = (inputs = workedExample) => draftOf(physiologist(), patientId, inputs);
const query = <T>(text: string, values: unknown[] = []) =>
  house.context.database.$client.query(text, values).then(({ rows }) => rows as T[]);

/** A range in force, so that the next is not the first. */
async function first() {
  return (await signOf(physician(), await draft()).expect(200)).body as { id: string };
}

describe('a draft', () => {
  it('holds the inputs and what the server works out of them', async () => {
    const { body } = await physiologist()
      .post(`/api/patients/${patientId}/prescriptions`)
      .send({ inputs: workedExample })
      .expect(201);
    expect(body).toEqual({
      id: expect.any(String),
      patientId,
      status: 'draft',
      version: 1,
      inputs: workedExample,
      result: JSON.parse(JSON.stringify(answerTo())),
      policyVersion: 1,
      engineVersion: '1.0.0',
      createdAt: '2026-12-01T15:00:00.000Z',
      createdBy: { id: people.physiologist.id, displayName: people.physiologist.displayName },
      changedAt: null,
      signedAt: null,
      signedBy: null,
      awaiting: null,
      physicianSignedAt: null,
      physicianSignedBy: null,
      activatedAt: null,
      endedAt: null,
      supersedes: null,
    });
    const read = await physiologist().get(`/api/prescriptions/${body.id}`).expect(200);
    expect(read.body).toEqual(body);
  });

  it('takes no result from its caller, and no choice that does not apply', async () => {
    const path = `/api/patients/${patientId}/prescriptions`;
    const told = { inputs: workedExample, result: answerTo() };
    expect((await physiologist().post(path).send(told).expect(422)).body.errors[0].path).toBe(
      'result',
    );
    const inputs = prescriptionInput((it) => (it.choice = { method: null, maximum: 'fox' }));
    const { body } = await physiologist().post(path).send({ inputs }).expect(422);
    expect(body).toMatchObject({
      code: 'not-applicable',
      errors: [{ path: 'inputs.choice.maximum' }],
    });
    const wrong = { inputs: { ...workedExample, programWeek: 0 } };
    const { body: invalid } = await physiologist().post(path).send(wrong).expect(422);
    expect(invalid.errors[0].path).toBe('inputs.programWeek');
  });

  it('needs a course', async () => {
    await query(
      `UPDATE enrollments SET status = 'discontinued', closed_on = '2026-12-01' WHERE id = $1`,
      [enrollmentId],
    );
    const { body } = await physiologist()
      .post(`/api/patients/${patientId}/prescriptions`)
      .send({ inputs: workedExample })
      .expect(409);
    expect(body.code).toBe('no-active-enrollment');
  });

  it('is changed by who has seen it last, and worked out anew', async () => {
    const { id } = await draft();
    house.clock.advance(60_000);
    const inputs = prescriptionInput((it) => (it.thresholds = []));
    const change = (version: number) =>
      people.nurse.agent.put(`/api/prescriptions/${id}`).send({ inputs, version });
    const { body } = await change(1).expect(200);
    expect(body).toMatchObject({ version: 2, changedAt: house.clock.now().toISOString() });
    expect(body.result).toEqual(JSON.parse(JSON.stringify(answerTo((it) => (it.thresholds = [])))));
    expect((await change(1).expect(409)).body.code).toBe('stale-version');
    house.clock.set('2026-12-01T15:00:00Z');
  });

  it('may be put aside, once, and is nothing more after that', async () => {
    const { id } = await draft();
    const revoke = (version: number) =>
      physiologist().post(`/api/prescriptions/${id}/revoke`).send({ version });
    expect((await revoke(7).expect(409)).body.code).toBe('stale-version');
    expect((await revoke(1).expect(200)).body).toMatchObject({ status: 'revoked', version: 2 });
    expect((await revoke(2).expect(409)).body.code).toBe('illegal-transition');
    const signed = await signOf(physiologist(), { id, version: 2 }).expect(409);
    expect(signed.body.code).toBe('illegal-transition');
  });
});

describe('the list', () => {
  it('is newest first', async () => {
    const older = await draft();
    house.clock.advance(1000);
    const newer = await draft();
    const { body } = await people.nurse.agent
      .get(`/api/patients/${patientId}/prescriptions`)
      .expect(200);
    expect((body.items as { id: string }[]).map(({ id }) => id)).toEqual([newer.id, older.id]);
    expect(body.nextCursor).toBeNull();
    house.clock.set('2026-12-01T15:00:00Z');
  });

  it('is unknown of a patient who is', async () => {
    await physiologist().get(`/api/patients/${randomUUID()}/prescriptions`).expect(404);
    await physiologist().get(`/api/prescriptions/${randomUUID()}`).expect(404);
    await signOf(physiologist(), { id: randomUUID(), version: 1 }).expect(404);
  });
});

describe('a first range', () => {
  it('waits for a physician after a physiologist signed it, then enters into force', async () => {
    const made = await draft();
    const { body: signed } = await signOf(physiologist(), made).expect(200);
    expect(signed).toMatchObject({
      status: 'draft',
      awaiting: 'physician',
      signedBy: { id: people.physiologist.id },
      activatedAt: null,
    });
    expect((await signOf(physiologist(), signed).expect(409)).body.code).toBe('already-signed');
    expect((await signOf(physician(), made).expect(409)).body.code).toBe('stale-version');
    const { body: active } = await signOf(physician(), signed).expect(200);
    expect(active).toMatchObject({
      status: 'active',
      awaiting: null,
      signedBy: { id: people.physiologist.id },
      physicianSignedBy: { id: people.physician.id },
      activatedAt: '2026-12-01T15:00:00.000Z',
    });
    expect((await signOf(physician(), active).expect(409)).body.code).toBe('already-signed');
  });

  it('enters into force by a physician alone, who signs for both', async () => {
    const { body } = await signOf(physician(), await draft()).expect(200);
    expect(body).toMatchObject({
      status: 'active',
      signedBy: { id: people.physician.id },
      physicianSignedBy: { id: people.physician.id },
    });
  });

  it('cannot be changed once signed', async () => {
    const { body: signed } = await signOf(physiologist(), await draft()).expect(200);
    const { body } = await physiologist()
      .put(`/api/prescriptions/${signed.id}`)
      .send({ inputs: workedExample, version: signed.version })
      .expect(409);
    expect(body.code).toBe('already-signed');
  });

  it('freezes how many sessions are planned', async () => {
    const plan = () =>
      query('UPDATE enrollments SET planned_sessions = 30 WHERE id = $1', [enrollmentId]);
    await plan();
    await signOf(physiologist(), await draft()).expect(200);
    await expect(
      query('UPDATE enrollments SET planned_sessions = 24 WHERE id = $1', [enrollmentId]),
    ).rejects.toMatchObject({ constraint: 'enrollments_planned_frozen' });
    await plan();
  });
});

describe('a further range', () => {
  it('enters into force by one signature, and ends the one before it', async () => {
    const former = await first();
    const { body } = await signOf(physiologist(), await draft()).expect(200);
    expect(body).toMatchObject({ status: 'active', awaiting: null, supersedes: former.id });
    const { body: ended } = await physiologist().get(`/api/prescriptions/${former.id}`);
    expect(ended).toMatchObject({ status: 'completed', endedAt: body.activatedAt });
    expect((await signOf(physician(), ended).expect(409)).body.code).toBe('already-signed');
  });

  it.each([
    ['of high risk', (it: typeof workedExample) => (it.risk = 'high')],
    ['of unknown risk', (it: typeof workedExample) => (it.risk = 'unknown')],
    ['with a stop caution', (it: typeof workedExample) => (it.devices.icd.status = 'unknown')],
    [
      'on an estimated maximum',
      (it: typeof workedExample) => {
        it.test = null;
        it.choice.maximum = 'brawner';
      },
    ],
    [
      'above the policy',
      (it: typeof workedExample) => (it.intensity = { lower: 0.4, upper: 0.85 }),
    ],
  ])('%s waits for a physician', async (_, change) => {
    const former = await first();
    const { body } = await signOf(physiologist(), await draft(prescriptionInput(change))).expect(
      200,
    );
    expect(body).toMatchObject({ status: 'draft', awaiting: 'physician', supersedes: former.id });
    const { body: active } = await signOf(physician(), body).expect(200);
    expect(active.status).toBe('active');
  });

  it('of a student waits for a physician; a student physician signs for staff alone', async () => {
    await first();
    const student = await buildStaff(house, people.site.id, 'exercise-physiologist', true);
    const { body } = await signOf(student.agent, await draft()).expect(200);
    expect(body.awaiting).toBe('physician');
    const resident = await buildStaff(house, people.site.id, 'physician', true);
    expect((await signOf(resident.agent, body).expect(409)).body.code).toBe('already-signed');
    const { body: own } = await signOf(resident.agent, await draft()).expect(200);
    expect(own).toMatchObject({ status: 'draft', awaiting: 'physician' });
  });

  it('puts aside what still waited for a physician', async () => {
    await first();
    const high = prescriptionInput((it) => (it.risk = 'high'));
    const { body: waiting } = await signOf(physiologist(), await draft(high)).expect(200);
    await signOf(physiologist(), await draft()).expect(200);
    const { body } = await physiologist().get(`/api/prescriptions/${waiting.id}`);
    expect(body).toMatchObject({ status: 'revoked', awaiting: null, endedAt: expect.any(String) });
    expect((await signOf(physician(), body).expect(409)).body.code).toBe('illegal-transition');
  });

  it('is not signed by rules that have changed since', async () => {
    await first();
    const made = await draft();
    await query(
      'INSERT INTO policies (version, content, note, effective_from) VALUES (2, $1, $2, $3)',
      [{ ...defaultPolicy, version: 2 }, 'as before', '2026-12-01T15:01:00Z'],
    );
    house.clock.set('2026-12-01T15:02:00Z');
    const { body } = await signOf(physiologist(), made).expect(409);
    expect(body).toMatchObject({ code: 'stale-version', title: expect.stringContaining('rules') });
    const kept = await physiologist()
      .put(`/api/prescriptions/${made.id}`)
      .send({ inputs: workedExample, version: 1 })
      .expect(200);
    expect((await signOf(physiologist(), kept.body).expect(200)).body.policyVersion).toBe(2);
    house.clock.set('2026-12-01T15:00:00Z');
  });
});

describe('a course that ends', () => {
  it('ends the range in force and puts aside what is written', async () => {
    const former = await first();
    const written = await draft();
    await people.nurse.agent
      .patch(`/api/patients/${patientId}/enrollments/${enrollmentId}`)
      .send({ version: 1, status: 'completed', closedOn: '2026-12-01', closedReason: 'completed' })
      .expect(200);
    const statusOf = async (id: string) =>
      (await physiologist().get(`/api/prescriptions/${id}`)).body.status as string;
    expect([await statusOf(former.id), await statusOf(written.id)]).toEqual([
      'completed',
      'revoked',
    ]);
  });

  it('takes no signature any more', async () => {
    const made = await draft();
    await query(
      `UPDATE enrollments SET status = 'discontinued', closed_on = '2026-12-01' WHERE id = $1`,
      [enrollmentId],
    );
    expect((await signOf(physiologist(), made).expect(409)).body.code).toBe('no-active-enrollment');
  });
});

it('leaves a record of each step, in its own transaction', async () => {
  const made = await draft();
  await signOf(physiologist(), made).expect(200);
  await signOf(physiologist(), made).expect(409);
  const events = await query<{ action: string; details: object }>(
    `SELECT action, details FROM audit_events WHERE object_id = $1 ORDER BY at, id`,
    [made.id],
  );
  expect(events.map(({ action }) => action).sort()).toEqual([
    'prescription.drafted',
    'prescription.signed',
  ]);
});
