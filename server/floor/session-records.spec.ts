import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { agentFor } from '../../test/builders/agent';
import { readingBody, recordBody } from '../../test/builders/floor';
import { buildUser } from '../../test/builders/people';
import { buildFloorWorld, type FloorWorld } from '../../test/builders/floor-world';

let world: FloorWorld;
beforeAll(async () => {
  world = await buildFloorWorld();
});
afterAll(() => world.close());

describe('beginning a record', () => {
  it('keeps when, by whom, the range in force and how the patient was identified', async () => {
    const { appointment, prescription } = await world.visit();
    const id = uuidv7();
    const reply = await world.nurse
      .put(`/api/session-records/${id}`)
      .send({
        ...recordBody(appointment.id),
        identityConfirmedWith: ['name', 'birth-date'],
      })
      .expect(201);
    expect(reply.body).toMatchObject({
      id,
      appointmentId: appointment.id,
      startedAt: '2026-12-01T14:00:00.000Z',
      prescriptionId: prescription?.id,
      identityConfirmedWith: ['name', 'birth-date'],
      signedAt: null,
      readings: [],
    });
    expect(await world.auditOf(id)).toEqual(['session-record.begun']);
  });

  it('answers the same again, the instant written otherwise', async () => {
    const { appointment } = await world.visit();
    const path = `/api/session-records/${uuidv7()}`;
    await world.nurse.put(path).send(recordBody(appointment.id)).expect(201);
    const again = recordBody(appointment.id, '2026-12-01T09:00:00-05:00');
    await world.nurse.put(path).send(again).expect(200);
    const other = recordBody(appointment.id, '2026-12-01T14:00:01Z');
    const refused = await world.nurse.put(path).send(other).expect(409);
    expect(refused.body.code).toBe('already-recorded');
  });

  it('names the record that another tablet began', async () => {
    const { appointment, recordId } = await world.begun();
    const reply = await world.nurse
      .put(`/api/session-records/${uuidv7()}`)
      .send(recordBody(appointment.id))
      .expect(409);
    expect(reply.body).toMatchObject({ code: 'already-recorded', sessionRecordId: recordId });
  });

  it.each(['booked', 'arrived', 'noshow'] as const)('waits for check-in: %s', async (status) => {
    const { appointment } = await world.visit({ status });
    const reply = await world.nurse
      .put(`/api/session-records/${uuidv7()}`)
      .send(recordBody(appointment.id))
      .expect(409);
    expect(reply.body.code).toBe('not-checked-in');
  });

  it.each([
    [{}, ['appointmentId', 'startedAt']],
    [{ startedAt: '2026-12-01T14:00:00' }, ['startedAt']],
    [{ startedAt: '1970-01-01T00:00:00Z' }, ['startedAt']],
    [{ identityConfirmedWith: ['name'] }, ['identityConfirmedWith']],
    [{ identityConfirmedWith: ['name', 'name'] }, ['identityConfirmedWith']],
    [{ signedAt: '2026-12-01T14:00:00Z' }, ['signedAt']],
  ])('refuses %j', async (given, paths) => {
    const whole = Object.keys(given).length === 0 ? {} : recordBody(uuidv7());
    const reply = await world.nurse
      .put(`/api/session-records/${uuidv7()}`)
      .send({ ...whole, ...given })
      .expect(422);
    expect(reply.body.errors.map(({ path }: { path: string }) => path)).toEqual(paths);
  });
});

describe('signing', () => {
  it('marks the visit as done, and again answers the first signature', async () => {
    const { recordId, appointment } = await world.begun();
    await world.put(uuidv7(), readingBody(recordId)).expect(201);
    const first = await world.sign(recordId).expect(200);
    expect(first.body).toMatchObject({
      exercised: true,
      signedAt: world.house.clock.now().toISOString(),
    });
    expect(first.body.readings).toHaveLength(1);
    const other = await buildUser(world.house.context.database, {
      roles: ['nurse'],
      siteIds: [world.site.id],
    });
    const second = await (
      await agentFor(world.house, other)
    )
      .post(`/api/session-records/${recordId}/sign`)
      .send({ exercised: false })
      .expect(200);
    expect(second.body).toEqual(first.body);
    const { rows } = await world.sql('SELECT status, exercised FROM appointments WHERE id = $1', [
      appointment.id,
    ]);
    expect(rows).toEqual([{ status: 'fulfilled', exercised: true }]);
    expect(await world.auditOf(recordId)).toContain('session-record.signed');
  });

  it('tells a visit without exercise from a session', async () => {
    const held = await world.begun();
    await world.put(uuidv7(), readingBody(held.recordId, { phase: 'resting' })).expect(201);
    expect((await world.sign(held.recordId).expect(200)).body.exercised).toBe(false);
    const told = await world.begun();
    expect((await world.sign(told.recordId, { exercised: true }).expect(200)).body.exercised).toBe(
      true,
    );
  });

  it('needs a patient who is checked in', async () => {
    const { recordId, appointment } = await world.begun();
    await world.sql(`UPDATE appointments SET status = 'booked' WHERE id = $1`, [appointment.id]);
    expect((await world.sign(recordId).expect(409)).body.code).toBe('not-checked-in');
    const { rows } = await world.sql('SELECT signed_at FROM session_records WHERE id = $1', [
      recordId,
    ]);
    expect(rows).toEqual([{ signed_at: null }]);
    await world.sign(uuidv7()).expect(404);
  });

  it('is not a student’s: what they entered waits for it', async () => {
    const { recordId } = await world.begun();
    const user = await buildUser(world.house.context.database, {
      roles: ['exercise-physiologist'],
      siteIds: [world.site.id],
      student: true,
    });
    const student = await agentFor(world.house, user);
    const id = uuidv7();
    const entered = await student
      .put(`/api/vital-signs/${id}`)
      .send(readingBody(recordId))
      .expect(201);
    expect(entered.body.status).toBe('preliminary');
    await student.post(`/api/session-records/${recordId}/sign`).expect(403);
    const signed = await world.sign(recordId).expect(200);
    expect(signed.body.readings).toEqual([expect.objectContaining({ id, status: 'final' })]);
    await student
      .post(`/api/vital-signs/${id}/amendments`)
      .send({ id: uuidv7(), reason: 'Wrong', heartRate: 96 })
      .expect(403);
  });
});
