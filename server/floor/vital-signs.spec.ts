import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Reading } from '@shared/contracts/floor-contract';
import { readingBody, recordBody } from '../../test/builders/floor';
import { buildUser } from '../../test/builders/people';
import { answerTo } from '../../test/builders/prescription-request';
import { buildPrescription } from '../../test/builders/prescriptions';
import { buildFloorWorld, type FloorWorld } from '../../test/builders/floor-world';

let world: FloorWorld;
beforeAll(async () => {
  world = await buildFloorWorld();
});
afterAll(() => world.close());

describe('a reading', () => {
  it('is stored with its place relative to the range', async () => {
    const { recordId } = await world.begun();
    const id = uuidv7();
    const body = readingBody(recordId, {
      systolic: 138,
      diastolic: 76,
      oxygenSaturation: 97,
      perceivedExertion: 12,
      symptoms: ['none'],
      note: '  Treadmill 2  ',
    });
    const reply = await world.put(id, body).expect(201);
    expect(reply.body).toMatchObject({
      ...body,
      id,
      note: 'Treadmill 2',
      placement: 'in',
      status: 'final',
      amends: null,
    });
    expect(await world.auditOf(id)).toEqual(['vital-signs.recorded']);
  });

  it.each([
    [90, 'below'],
    [91, 'in'],
    [108, 'in'],
    [109, 'over-ceiling'],
  ])('at %d bpm lies %s', async (heartRate, placement) => {
    const { recordId } = await world.begun();
    const reply = await world.put(uuidv7(), readingBody(recordId, { heartRate })).expect(201);
    expect(reply.body.placement).toBe(placement);
  });

  it('counts the ceiling where effort leads, and nothing without a range', async () => {
    const answer = { ...answerTo(), leadBy: 'perceived-exertion', target: null };
    const led = await world.begun({ range: { result: answer } });
    const place = async (recordId: string, heartRate: number) =>
      (
        (await world.put(uuidv7(), readingBody(recordId, { heartRate })).expect(201))
          .body as Reading
      ).placement;
    expect(await place(led.recordId, 100)).toBeNull();
    expect(await place(led.recordId, 109)).toBe('over-ceiling');
    expect(await place((await world.begun({ range: false })).recordId, 180)).toBeNull();
  });

  it('leaves the target out while the range is withdrawn', async () => {
    const { patient, appointment } = await world.visit();
    const by = await buildUser(world.house.context.database, { roles: ['nurse'] });
    await world.sql(
      `INSERT INTO clinical_events (id, patient_id, kind, description, occurred_on, recorded_at, recorded_by)
       VALUES ($1, $2, 'hospital-stay', 'Heart failure', '2026-11-28', '2026-11-29T10:00:00Z', $3)`,
      [uuidv7(), patient.id, by.id],
    );
    const recordId = uuidv7();
    await world.nurse
      .put(`/api/session-records/${recordId}`)
      .send(recordBody(appointment.id))
      .expect(201);
    const inside = await world.put(uuidv7(), readingBody(recordId)).expect(201);
    expect(inside.body.placement).toBeNull();
    const over = await world.put(uuidv7(), readingBody(recordId, { heartRate: 109 })).expect(201);
    expect(over.body.placement).toBe('over-ceiling');
  });

  it('is placed against the range that the record began with, whatever is signed later', async () => {
    const { recordId, patient, prescription } = await world.begun();
    await world.sql(`UPDATE prescriptions SET status = 'completed', ended_at = $2 WHERE id = $1`, [
      prescription?.id,
      world.house.clock.now(),
    ]);
    const wider = {
      ...answerTo(),
      target: { lower: 60, upper: 80 },
      ceiling: { value: 90, bindingLimits: [] },
    };
    await buildPrescription(world.house.context.database, {
      patientId: patient.id,
      enrollmentId: patient.enrollmentId,
      result: wider,
      activatedAt: world.house.clock.now(),
    });
    const reply = await world.put(uuidv7(), readingBody(recordId)).expect(201);
    expect(reply.body.placement).toBe('in');
  });

  it('sent again is the same: instants as instants, absent as null, symptoms as a set', async () => {
    const { recordId } = await world.begun();
    const id = uuidv7();
    const first = await world
      .put(id, readingBody(recordId, { symptoms: ['dizziness', 'nausea'] }))
      .expect(201);
    const again = await world
      .put(
        id,
        readingBody(recordId, {
          measuredAt: '2026-12-01T09:10:00-05:00',
          symptoms: ['nausea', 'dizziness', 'nausea'],
          note: '',
          systolic: null,
        }),
      )
      .expect(200);
    expect(again.body).toEqual(first.body);
    for (const other of [
      { heartRate: 101 },
      { phase: 'recovery' },
      { note: 'x' },
      { symptoms: [] },
    ]) {
      const body = readingBody(recordId, { symptoms: ['dizziness', 'nausea'], ...other });
      expect((await world.put(id, body).expect(409)).body.code).toBe('already-recorded');
    }
    const elsewhere = readingBody((await world.begun()).recordId, {
      symptoms: ['dizziness', 'nausea'],
    });
    expect((await world.put(id, elsewhere).expect(409)).body.code).toBe('already-recorded');
    const { rows } = await world.sql('SELECT id FROM vital_signs WHERE id = $1', [id]);
    expect(rows).toHaveLength(1);
    expect(await world.auditOf(id)).toEqual(['vital-signs.recorded', 'vital-signs.sent-again']);
  });

  it.each([
    ['heartRate', 19],
    ['heartRate', 301],
    ['heartRate', 99.5],
    ['systolic', 39],
    ['systolic', 301],
    ['oxygenSaturation', 49],
    ['oxygenSaturation', 101],
    ['perceivedExertion', 5],
    ['perceivedExertion', 21],
    ['phase', 'cool-down'],
    ['measuredAt', 'today'],
    ['heartrate', 100],
  ])('refuses %s %s', async (path, value) => {
    const { recordId } = await world.begun();
    const reply = await world.put(uuidv7(), readingBody(recordId, { [path]: value })).expect(422);
    expect(reply.body.errors).toEqual([expect.objectContaining({ path })]);
  });

  it.each([
    [{ systolic: 120, diastolic: 120 }, 'diastolic'],
    [{ systolic: 120, diastolic: 19 }, 'diastolic'],
    [{ diastolic: 80 }, 'systolic'],
    [{ heartRate: null }, 'heartRate'],
    [{ symptoms: ['none', 'nausea'] }, 'symptoms'],
  ])('refuses %j beside %s', async (given, path) => {
    const { recordId } = await world.begun();
    const reply = await world.put(uuidv7(), readingBody(recordId, given)).expect(422);
    expect(reply.body.errors).toEqual([expect.objectContaining({ path })]);
  });

  it.each([
    ['heartRate', 20],
    ['heartRate', 300],
    ['systolic', 40],
    ['systolic', 300],
    ['oxygenSaturation', 50],
    ['oxygenSaturation', 100],
    ['perceivedExertion', 6],
    ['perceivedExertion', 20],
  ])('takes %s %d', async (path, value) => {
    const { recordId } = await world.begun();
    await world.put(uuidv7(), readingBody(recordId, { [path]: value })).expect(201);
  });

  it('needs a patient who is checked in, and a record that is not signed', async () => {
    const { recordId, appointment } = await world.begun();
    const id = uuidv7();
    await world.put(id, readingBody(recordId)).expect(201);
    await world.sql(`UPDATE appointments SET status = 'booked' WHERE id = $1`, [appointment.id]);
    expect((await world.put(uuidv7(), readingBody(recordId)).expect(409)).body.code).toBe(
      'not-checked-in',
    );
    await world.put(id, readingBody(recordId)).expect(200);
    await world.sql(`UPDATE appointments SET status = 'checked-in' WHERE id = $1`, [
      appointment.id,
    ]);
    await world.sign(recordId).expect(200);
    expect((await world.put(uuidv7(), readingBody(recordId)).expect(409)).body.code).toBe(
      'record-signed',
    );
    await world.put(id, readingBody(recordId)).expect(200);
    const other = await world.put(id, readingBody(recordId, { heartRate: 101 })).expect(409);
    expect(other.body.code).toBe('already-recorded');
    await world.put(uuidv7(), readingBody(uuidv7())).expect(404);
  });
});
