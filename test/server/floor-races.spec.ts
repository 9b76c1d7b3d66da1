import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SessionRecord } from '@shared/contracts/floor-contract';
import { readingBody, recordBody } from '../builders/floor';
import { buildFloorWorld, type FloorWorld } from '../builders/floor-world';

const times = <T>(count: number, of: (each: number) => T): T[] =>
  Array.from({ length: count }, (_, each) => of(each));

const tally = (replies: readonly { readonly status: number }[]): Record<number, number> =>
  replies.reduce<Record<number, number>>(
    (counts, { status }) => ({ ...counts, [status]: (counts[status] ?? 0) + 1 }),
    {},
  );

describe('writes of the floor', () => {
  let world: FloorWorld;
  beforeAll(async () => {
    world = await buildFloorWorld();
  });
  afterAll(() => world.close());

  const rowsOf = async (recordId: string): Promise<string[]> => {
    const found = await world.sql('SELECT id FROM vital_signs WHERE session_record_id = $1', [
      recordId,
    ]);
    return (found.rows as { id: string }[]).map(({ id }) => id);
  };

  it('one record sent twenty times at once, then five times more, is one', async () => {
    const { appointment } = await world.visit();
    const path = `/api/session-records/${uuidv7()}`;
    const send = () => world.nurse.put(path).send(recordBody(appointment.id));
    expect(tally(await Promise.all(times(20, send)))).toEqual({ 200: 19, 201: 1 });
    for (const again of times(5, send)) expect((await again).status).toBe(200);
  });

  it('twenty tablets beginning one visit at once make one record, and each learns which', async () => {
    const { appointment } = await world.visit();
    const replies = await Promise.all(
      times(20, () =>
        world.nurse.put(`/api/session-records/${uuidv7()}`).send(recordBody(appointment.id)),
      ),
    );
    expect(tally(replies)).toEqual({ 201: 1, 409: 19 });
    const made = replies.find(({ status }) => status === 201)?.body as SessionRecord;
    const told = replies
      .filter(({ status }) => status === 409)
      .map(({ body }) => (body as { sessionRecordId: string }).sessionRecordId);
    expect(new Set(told)).toEqual(new Set([made.id]));
  });

  it('one reading sent twenty times at once, then five times more, is one', async () => {
    const { recordId } = await world.begun();
    const id = uuidv7();
    const send = () => world.put(id, readingBody(recordId));
    const replies = await Promise.all(times(20, send));
    expect(tally(replies)).toEqual({ 200: 19, 201: 1 });
    for (const again of times(5, send)) expect((await again).status).toBe(200);
    for (const { body } of replies) expect(body).toEqual(replies[0]?.body);
    expect(await rowsOf(recordId)).toEqual([id]);
  });

  it('two different readings under one id: the first stays, the other is refused', async () => {
    const { recordId } = await world.begun();
    const id = uuidv7();
    const replies = await Promise.all(
      times(20, (each) => world.put(id, readingBody(recordId, { heartRate: 100 + (each % 2) }))),
    );
    expect(tally(replies)).toEqual({ 200: 9, 201: 1, 409: 10 });
    expect(await rowsOf(recordId)).toEqual([id]);
  });

  it('fifty readings at once are fifty', async () => {
    const { recordId } = await world.begun();
    const ids = times(50, () => uuidv7());
    const replies = await Promise.all(ids.map((id) => world.put(id, readingBody(recordId))));
    expect(tally(replies)).toEqual({ 201: 50 });
    expect((await rowsOf(recordId)).sort()).toEqual([...ids].sort());
  });

  it('one amendment sent twenty times at once is one; of twenty others, one stands', async () => {
    const { recordId } = await world.begun();
    const amend = (original: string, id: string) =>
      world.nurse
        .post(`/api/vital-signs/${original}/amendments`)
        .send({ id, reason: 'Digits swapped', heartRate: 96 });
    const [one, other] = [uuidv7(), uuidv7()];
    await world.put(one, readingBody(recordId)).expect(201);
    await world.put(other, readingBody(recordId)).expect(201);
    const id = uuidv7();
    const same = await Promise.all(times(20, () => amend(one, id)));
    expect(tally(same)).toEqual({ 200: 19, 201: 1 });
    const different = await Promise.all(times(20, () => amend(other, uuidv7())));
    expect(tally(different)).toEqual({ 201: 1, 409: 19 });
    expect(await rowsOf(recordId)).toHaveLength(4);
  });

  it('twenty signatures at once are the first one', async () => {
    const { recordId } = await world.begun();
    const replies = await Promise.all(times(20, () => world.sign(recordId)));
    expect(tally(replies)).toEqual({ 200: 20 });
    expect(new Set(replies.map(({ body }) => JSON.stringify(body))).size).toBe(1);
    const { rows } = await world.sql(
      `SELECT 1 FROM audit_events WHERE object_id = $1 AND action = 'session-record.signed'`,
      [recordId],
    );
    expect(rows).toHaveLength(1);
  });

  it('what was signed holds every reading that was taken, and none slips in after it', async () => {
    for (let round = 0; round < 5; round += 1) {
      const { recordId } = await world.begun();
      const writes = times(20, () => world.put(uuidv7(), readingBody(recordId)));
      const signed = new Promise((resolve) => setTimeout(resolve, 5 * round)).then(() =>
        world.sign(recordId).expect(200),
      );
      const [replies, { body }] = await Promise.all([Promise.all(writes), signed]);
      const taken = replies.filter(({ status }) => status === 201).length;
      const late = replies.filter((reply) => reply.body.code === 'record-signed').length;
      expect(taken + late).toBe(20);
      expect((body as SessionRecord).readings).toHaveLength(taken);
      expect(await rowsOf(recordId)).toHaveLength(taken);
    }
  });

  it('the database itself lets no reading slip in beside a signature', async () => {
    const { recordId, patient } = await world.begun();
    const client = await world.house.context.database.$client.connect();
    const insert = `INSERT INTO vital_signs (id, session_record_id, patient_id, phase, measured_at, recorded_by)
      SELECT $1, $2, $3, 'exercise', now(), recorded_by FROM session_records WHERE id = $2`;
    await client.query('BEGIN');
    await client.query(
      'UPDATE session_records SET signed_at = now(), signed_by = recorded_by WHERE id = $1',
      [recordId],
    );
    const refused = expect(
      world.sql(insert, [uuidv7(), recordId, patient.id]),
    ).rejects.toMatchObject({ constraint: 'vital_signs_record_open' });
    await new Promise((resolve) => setTimeout(resolve, 100));
    await client.query('COMMIT');
    client.release();
    await refused;
  });
});
