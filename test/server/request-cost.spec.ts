import pg from 'pg';
import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { readingBody } from '../builders/floor';
import { buildFloorWorld, type FloorWorld } from '../builders/floor-world';

/** What the house adds to a call, beside the ends of its transaction. */
const house = ['read-session', 'record-owner', 'record-audit'];

interface Named {
  readonly name?: string;
  readonly text: string;
}

describe('what a call costs', () => {
  let world: FloorWorld;
  beforeAll(async () => {
    world = await buildFloorWorld();
  });
  afterAll(() => world.close());

  /** The statements of a call, by name; one without a name is planned anew each time. */
  async function statementsOf(call: () => PromiseLike<unknown>): Promise<string[]> {
    await call();
    const query = vi.spyOn(pg.Client.prototype, 'query');
    await call();
    const sent = query.mock.calls.map(([given]) => given as unknown as Named | string);
    query.mockRestore();
    return sent.map((one) => (typeof one === 'string' ? one : (one.name ?? one.text)));
  }

  it('is a session, an event and two statements planned once, for a page of patients', async () => {
    const page = () => world.nurse.post('/api/patients/search').send({ limit: 25 }).expect(200);
    await world.visit();
    expect(await statementsOf(page)).toEqual([
      'read-session',
      'BEGIN',
      'patients-first-page',
      'range-states',
      'record-audit',
      'COMMIT',
    ]);
  });

  it('is a session, an event, the patient’s owner and two statements planned once, for a reading', async () => {
    const { recordId } = await world.begun();
    const write = () => world.put(uuidv7(), readingBody(recordId)).expect(201);
    expect(await statementsOf(write)).toEqual([
      'read-session',
      'BEGIN',
      'lock-session-record-share',
      'record-owner',
      'insert-reading',
      'record-audit',
      'COMMIT',
    ]);
  });

  it('is no more than three statements of the house, whatever is read of a patient', async () => {
    const { patient, classDate } = await world.begun();
    for (const path of [
      `/api/patients/${patient.id}`,
      `/api/patients/${patient.id}/record`,
      `/api/patients/${patient.id}/prescriptions`,
      `/api/patients/${patient.id}/vital-signs`,
      `/api/appointments?patientId=${patient.id}`,
      `/api/class-dates/${classDate.id}/roster`,
    ]) {
      const sent = await statementsOf(() => world.nurse.get(path).expect(200));
      const own = sent.filter((one) => house.includes(one));
      expect([path, own.length]).toEqual([path, new Set(own).size]);
      expect(own).toContain('record-audit');
    }
  });
});
