import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { counterDifferences } from '../../server/schedule/counters-service';
import {
  bookOver,
  call,
  deadlocksOf,
  deskCaller,
  heldIn,
  overlapsIn,
  patientCallers,
  raceDate,
  startRace,
  type Race,
} from './booking-race';
import {
  aWholeDayAtOnce,
  BOOKERS,
  CHANNELS,
  oneAgainstOneself,
  PLACES,
  seriesThatMeet,
  stampede,
  stampedeOnChannels,
  twoPlacesAtOnce,
} from './booking-scenes';

describe('through two server processes', () => {
  let race: Race;
  beforeAll(async () => {
    race = await startRace();
  });
  afterAll(() => race.close());

  it(`${BOOKERS} bookers of a class of ${PLACES} take exactly ${PLACES} places`, async () => {
    expect(await stampede(race)).toEqual({
      booked: PLACES,
      full: BOOKERS - PLACES,
      held: PLACES,
    });
  });

  it('patients who need a channel take as many places as there are channels', async () => {
    expect(await stampedeOnChannels(race)).toEqual({
      booked: CHANNELS,
      full: 60 - CHANNELS,
      held: CHANNELS,
    });
  });

  it('a patient who asks for a whole day at once gets what the day allows', async () => {
    expect(new Set(await aWholeDayAtOnce(race))).toEqual(new Set([2]));
  });

  it('two bookings of one patient that each want what the other took leave one place at a time', async () => {
    await oneAgainstOneself(race);
    expect(await overlapsIn(race)).toBe(0);
  });

  it('a patient who asks for two overlapping classes at once gets one', async () => {
    const pairs = await twoPlacesAtOnce(race);
    for (const pair of pairs) {
      expect(pair.map(({ status }) => status).sort()).toEqual([201, 409]);
      expect(pair.find(({ status }) => status === 409)?.body.code).toBe('overlapping-appointment');
    }
    expect(await overlapsIn(race)).toBe(0);
  });

  it('one key sent many times at once makes one appointment, answered alike', async () => {
    const date = await raceDate(race, { localStart: '12:00' });
    const [caller] = await patientCallers(race, 1);
    const key = randomUUID();
    const answers = await Promise.all(
      Array.from({ length: 20 }, (_, turn) => bookOver(race, turn, caller!.agent, date.id, key)),
    );
    expect(new Set(answers.map(({ status }) => status))).toEqual(new Set([201]));
    expect(new Set(answers.map(({ body }) => body.id)).size).toBe(1);
    expect(await heldIn(race, date.id)).toBe(1);
  });

  it('series over the same dates, in any order, book whole or not at all', async () => {
    const dates = await Promise.all(
      Array.from({ length: 12 }, (_, hour) =>
        raceDate(race, { capacity: 4, localStart: `${String(7 + hour).padStart(2, '0')}:00` }),
      ),
    );
    const ids = dates.map(({ id }) => id);
    const desk = await deskCaller(race);
    const callers = await patientCallers(race, 12);
    const answers = await Promise.all(
      callers.map(({ patientId, agent }, turn) => {
        // Two a day is the limit: each takes a pair, every other one in the opposite order.
        const pair = [ids[turn % 4] as string, ids[4 + (turn % 3)] as string];
        const classDateIds = turn % 2 === 0 ? pair : pair.reverse();
        return Promise.all([
          call(race, turn, desk, {
            path: '/api/appointments/series',
            body: { patientId, classDateIds },
          }),
          bookOver(race, turn + 1, agent, ids[4 + (turn % 3)] as string),
        ]);
      }),
    );
    expect(answers.flat().every(({ status }) => status === 201 || status === 409)).toBe(true);
    const { rows } = await race.testApp.context.database.$client.query<{ held: number }>(
      `SELECT count(*)::int AS held FROM appointments
        WHERE patient_id = ANY ($1) AND status = 'booked' GROUP BY patient_id`,
      [callers.map(({ patientId }) => patientId)],
    );
    expect(rows.every(({ held }) => held === 1 || held === 2)).toBe(true);
  });

  it('long series that meet on every date fill each of them', async () => {
    const held = Array.from({ length: 24 }, () => 5);
    expect(await seriesThatMeet(race)).toEqual({ booked: 5, full: 5, held });
  });

  it('cancelling and booking again at once keeps to the places', async () => {
    const date = await raceDate(race, { capacity: 6, localStart: '17:00' });
    const callers = await patientCallers(race, 12);
    const first = await Promise.all(
      callers.map(({ agent }, turn) => bookOver(race, turn, agent, date.id)),
    );
    await Promise.all(
      callers.map(async ({ agent }, turn) => {
        const { body } = first[turn]!;
        const cancelled =
          body.id &&
          call(race, turn, agent, {
            method: 'PATCH',
            path: `/api/appointments/${body.id}`,
            body: { status: 'cancelled', version: 1 },
          });
        await Promise.all([cancelled, bookOver(race, turn + 1, agent, date.id)]);
      }),
    );
    expect(await heldIn(race, date.id)).toBeLessThanOrEqual(6);
  });

  it('leaves every counter as its appointments say', async () => {
    expect(await counterDifferences(race.testApp.context.database)).toEqual([]);
  });

  it('had nobody wait for each other in a ring: not one deadlock', async () => {
    expect(await deadlocksOf(race)).toBe(0);
  });
});
