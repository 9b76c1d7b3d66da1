import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { SessionRecord } from '@shared/contracts/floor-contract';
import { readingBody } from '../../test/builders/floor';
import { buildFloorWorld, type FloorWorld } from '../../test/builders/floor-world';

let world: FloorWorld;
beforeAll(async () => {
  world = await buildFloorWorld();
});
afterAll(() => world.close());

describe('an amendment', () => {
  const amend = (id: string, body: object) =>
    world.nurse.post(`/api/vital-signs/${id}/amendments`).send(body);

  it('keeps the first and says why, before and after the signature', async () => {
    const { recordId } = await world.begun();
    const first = uuidv7();
    await world.put(first, readingBody(recordId, { heartRate: 190 })).expect(201);
    const second = uuidv7();
    const correction = { id: second, reason: 'Digits swapped', heartRate: 109 };
    const reply = await amend(first, correction).expect(201);
    expect(reply.body).toMatchObject({
      id: second,
      amends: first,
      amendmentReason: 'Digits swapped',
      phase: 'exercise',
      measuredAt: '2026-12-01T14:10:00.000Z',
      heartRate: 109,
      placement: 'over-ceiling',
    });
    await world.sign(recordId).expect(200);
    const third = {
      ...readingBody(recordId, { heartRate: 91 }),
      id: uuidv7(),
      reason: 'Strip read again',
    };
    await amend(second, third).expect(201);
    await amend(second, third).expect(200);
    await amend(first, correction).expect(200);
    const { body } = await world.nurse.get(`/api/session-records/${recordId}`).expect(200);
    const chain = (body as SessionRecord).readings.map(({ heartRate, status, amends }) => [
      heartRate,
      status,
      amends,
    ]);
    expect(chain).toEqual([
      [190, 'amended', null],
      [109, 'amended', first],
      [91, 'final', second],
    ]);
  });

  it('is made once: a second one of the same reading is stale', async () => {
    const { recordId } = await world.begun();
    const first = uuidv7();
    await world.put(first, readingBody(recordId)).expect(201);
    await amend(first, { id: uuidv7(), reason: 'Wrong', heartRate: 96 }).expect(201);
    const late = await amend(first, { id: uuidv7(), reason: 'Wrong', heartRate: 97 }).expect(409);
    expect(late.body.code).toBe('stale-version');
    const taken = await amend(first, { id: first, reason: 'Wrong', heartRate: 97 }).expect(409);
    expect(taken.body.code).toBe('already-recorded');
  });

  it('strikes out a reading that never was this patient’s', async () => {
    const { recordId } = await world.begun();
    const first = uuidv7();
    await world.put(first, readingBody(recordId)).expect(201);
    const strike = { id: uuidv7(), reason: 'Another patient', enteredInError: true };
    const withValues = await amend(first, { ...strike, heartRate: 90 }).expect(422);
    expect(withValues.body.errors).toEqual([expect.objectContaining({ path: 'enteredInError' })]);
    const reply = await amend(first, strike).expect(201);
    expect(reply.body).toMatchObject({ status: 'entered-in-error', heartRate: null });
    const signed = await world.sign(recordId).expect(200);
    expect(signed.body.exercised).toBe(false);
  });

  it('needs a reason, and stays in its record', async () => {
    const { recordId } = await world.begun();
    const first = uuidv7();
    await world.put(first, readingBody(recordId)).expect(201);
    await amend(first, { id: uuidv7(), heartRate: 96 }).expect(422);
    const foreign = readingBody(uuidv7(), { id: uuidv7(), reason: 'Wrong' });
    const reply = await amend(first, foreign).expect(422);
    expect(reply.body.errors).toEqual([expect.objectContaining({ path: 'sessionRecordId' })]);
    await amend(uuidv7(), { id: uuidv7(), reason: 'Wrong', heartRate: 96 }).expect(404);
  });
});
