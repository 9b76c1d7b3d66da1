import pg from 'pg';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import type { Roster } from '@shared/contracts/floor-contract';
import { readingBody, recordBody, buildVisit } from '../../test/builders/floor';
import { buildClassDate } from '../../test/builders/schedule';
import { buildFloorWorld, type FloorWorld } from '../../test/builders/floor-world';

let world: FloorWorld;
beforeAll(async () => {
  world = await buildFloorWorld();
});
afterAll(() => world.close());

describe('the roster', () => {
  it('shows each patient with range, visit and readings, in the order of their places', async () => {
    const { database } = world.house.context;
    const classDate = await buildClassDate(database, world.site, { localDate: '2026-12-01' });
    const first = await buildVisit(database, world.site, classDate);
    const second = await buildVisit(database, world.site, classDate, {
      status: 'booked',
      range: false,
    });
    await buildVisit(database, world.site, classDate, { status: 'cancelled' });
    const recordId = uuidv7();
    await world.nurse
      .put(`/api/session-records/${recordId}`)
      .send(recordBody(first.appointment.id))
      .expect(201);
    await world.put(uuidv7(), readingBody(recordId)).expect(201);
    const { body } = await world.nurse.get(`/api/class-dates/${classDate.id}/roster`).expect(200);
    expect((body as Roster).items).toMatchObject([
      {
        appointmentId: first.appointment.id,
        patientId: first.patient.id,
        displayName: `${first.patient.givenName} ${first.patient.familyName}`,
        recordNumber: first.patient.recordNumber,
        birthDate: '1961-04-17',
        status: 'checked-in',
        leadBy: 'heart-rate',
        target: { lower: 91, upper: 108 },
        ceiling: { value: 108, bindingLimits: ['ischemia'] },
        perceivedExertion: { lower: 11, upper: 14 },
        icd: { status: 'unknown', lowestRate: null },
        withdrawn: [],
        rangeFlags: [],
        nextStart: null,
        work: null,
        record: { id: recordId, signedAt: null },
        readings: [{ heartRate: 100, placement: 'in' }],
      },
      {
        appointmentId: second.appointment.id,
        status: 'booked',
        leadBy: null,
        target: null,
        ceiling: null,
        perceivedExertion: null,
        record: null,
        readings: [],
      },
    ]);
    const { rows } = await world.sql(
      `SELECT patient_id FROM audit_events WHERE action = 'roster.read' AND object_id = $1`,
      [classDate.id],
    );
    expect(rows.map(({ patient_id }) => patient_id).sort()).toEqual(
      [first.patient.id, second.patient.id].sort(),
    );
  });

  it('shows what may not be done, by order and by policy', async () => {
    const { database } = world.house.context;
    const classDate = await buildClassDate(database, world.site, { localDate: '2026-12-01' });
    const { patient } = await buildVisit(database, world.site, classDate);
    await world.nurse
      .post(`/api/patients/${patient.id}/record`)
      .send({
        entries: [
          {
            kind: 'clinical-events',
            values: { kind: 'bypass', description: '', occurredOn: '2026-11-01' },
          },
          {
            kind: 'restrictions',
            values: {
              kind: 'lifting',
              limit: 4.5,
              orderedBy: 'The surgeon',
              orderedOn: '2026-11-02',
              until: '2026-12-01',
            },
          },
          {
            kind: 'restrictions',
            values: {
              kind: 'fall',
              orderedBy: 'The surgeon',
              orderedOn: '2026-11-02',
              until: '2026-11-30',
            },
          },
        ],
      })
      .expect(201);
    const restrictions = async () => {
      const roster = await world.nurse.get(`/api/class-dates/${classDate.id}/roster`).expect(200);
      return (roster.body as Roster).items[0]?.restrictions;
    };
    const lifting = { kind: 'lifting', title: 'Lifting limit 4.5 kg', byPolicy: false };
    const sternum = (week: number) => ({
      kind: 'sternum',
      words: expect.stringContaining(`Until week ${week}.`),
      byPolicy: true,
    });
    expect(await restrictions()).toMatchObject([lifting, sternum(12)]);
    await world.sql(
      `INSERT INTO policies (version, content, training, note, effective_from)
       SELECT 2, content || '{"version": 2}', '{"resistance": {"upperAfterSternotomy": 9}}', 'by hand', $1 FROM policies`,
      [world.house.clock.now()],
    );
    expect(await restrictions()).toMatchObject([lifting, sternum(9)]);
  });

  it('says when the range has changed since the record began', async () => {
    const { recordId, prescription, classDate } = await world.begun();
    await world.sql(`UPDATE prescriptions SET status = 'revoked', ended_at = now() WHERE id = $1`, [
      prescription?.id,
    ]);
    const { body } = await world.nurse.get(`/api/class-dates/${classDate.id}/roster`).expect(200);
    expect((body as Roster).items).toMatchObject([
      { record: { id: recordId }, target: { lower: 91, upper: 108 }, flags: ['range-changed'] },
    ]);
  });

  it('takes the same number of statements for one patient as for twelve', async () => {
    const { database } = world.house.context;
    const statements = async (people: number) => {
      const classDate = await buildClassDate(database, world.site, { localDate: '2026-12-01' });
      for (let each = 0; each < people; each += 1)
        await buildVisit(database, world.site, classDate);
      const query = vi.spyOn(pg.Client.prototype, 'query');
      await world.nurse.get(`/api/class-dates/${classDate.id}/roster`).expect(200);
      const sent = query.mock.calls.length;
      query.mockRestore();
      return sent;
    };
    const one = await statements(1);
    expect(await statements(12)).toBe(one);
    // Session, begin, five of the roster's own, audit, commit.
    expect(one).toBe(9);
  });

  it('has a stamp that moves with every write', async () => {
    const { classDate, recordId } = await world.begun();
    const stamp = async () =>
      (await world.nurse.get(`/api/class-dates/${classDate.id}/roster/stamp`).expect(200)).body
        .stamp;
    const seen = [await stamp()];
    const reading = uuidv7();
    await world.put(reading, readingBody(recordId)).expect(201);
    seen.push(await stamp());
    await world.nurse
      .post(`/api/vital-signs/${reading}/amendments`)
      .send({ id: uuidv7(), reason: 'Wrong', heartRate: 96 })
      .expect(201);
    seen.push(await stamp());
    await world.sign(recordId).expect(200);
    seen.push(await stamp());
    expect(new Set(seen).size).toBe(4);
    expect(await stamp()).toBe(seen.at(-1));
  });
});
