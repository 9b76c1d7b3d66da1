import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { counterDifferences } from '../../server/schedule/counters-service';
import {
  bookOver,
  call,
  deadlocksIn,
  deskCaller,
  heldIn,
  overlapsIn,
  patientCallers,
  raceDate,
  startRace,
  type Race,
} from './booking-race';

const BOOKERS = 200;
const PLACES = 12;

/** All at once on one class. @returns how many answers of each kind, and how many places its rows hold */
async function stampede(race: Race) {
  const date = await raceDate(race, { capacity: PLACES });
  const callers = await patientCallers(race, BOOKERS);
  const answers = await Promise.all(
    callers.map(({ agent }, turn) => bookOver(race, turn, agent, date.id)),
  );
  const count = (wanted: (status: number, code: string | undefined) => boolean) =>
    answers.filter(({ status, body }) => wanted(status, body.code)).length;
  return {
    booked: count((status) => status === 201),
    full: count((status, code) => status === 409 && code === 'class-full'),
    held: await heldIn(race, date.id),
  };
}

/** Each patient asks at once for two classes that overlap. @returns the answers, a pair a patient */
async function twoPlacesAtOnce(race: Race) {
  const nine = await raceDate(race, { capacity: 60, localStart: '09:00' });
  const half = await raceDate(race, { capacity: 60, localStart: '09:30' });
  const callers = await patientCallers(race, 30);
  return Promise.all(
    callers.map(({ agent }, turn) =>
      Promise.all([bookOver(race, turn, agent, nine.id), bookOver(race, turn + 1, agent, half.id)]),
    ),
  );
}

describe('through two server processes', () => {
  let race: Race;
  beforeAll(async () => {
    race = await startRace(true);
  });
  afterAll(() => race.close());

  it(`${BOOKERS} bookers of a class of ${PLACES} take exactly ${PLACES} places`, async () => {
    expect(await stampede(race)).toEqual({
      booked: PLACES,
      full: BOOKERS - PLACES,
      held: PLACES,
    });
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

  it('series over the same dates, in any order, book whole or not at all, without a deadlock', async () => {
    const deadlocks = await deadlocksIn(race);
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
    expect(await deadlocksIn(race)).toBe(deadlocks);
  });

  it('long series that meet on every date never wait for each other in a ring', async () => {
    const deadlocks = await deadlocksIn(race);
    const days = Array.from({ length: 24 }, (_, day) =>
      new Date(Date.now() + (10 + day) * 86_400_000).toISOString().slice(0, 10),
    );
    const ids: string[] = [];
    for (const localDate of days) ids.push((await raceDate(race, { localDate, capacity: 5 })).id);
    const desk = await deskCaller(race);
    const callers = await patientCallers(race, 10);
    const answers = await Promise.all(
      callers.map(({ patientId }, turn) => {
        const classDateIds = [...ids.slice(turn), ...ids.slice(0, turn)];
        if (turn % 2 === 1) classDateIds.reverse();
        return call(race, turn, desk, {
          path: '/api/appointments/series',
          body: { patientId, classDateIds },
        });
      }),
    );
    expect(answers.filter(({ status }) => status === 201)).toHaveLength(5);
    expect(answers.filter(({ body }) => body.code === 'class-full')).toHaveLength(5);
    for (const id of ids) expect(await heldIn(race, id)).toBe(5);
    expect(await deadlocksIn(race)).toBe(deadlocks);
  });

  it('cancelling and booking again at once keeps the counters, without a deadlock', async () => {
    const deadlocks = await deadlocksIn(race);
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
    expect(await deadlocksIn(race)).toBe(deadlocks);
  });

  it('leaves every counter as its appointments say', async () => {
    expect(await counterDifferences(race.testApp.context.database)).toEqual([]);
  });
});

describe('the same races without the database’s last word', () => {
  let race: Race;
  beforeAll(async () => {
    race = await startRace(false);
  });
  afterAll(() => race.close());

  it('overbook the class', async () => {
    const { held } = await stampede(race);
    expect(held).toBeGreaterThan(PLACES);
  });

  it('put a patient in two places at once', async () => {
    await twoPlacesAtOnce(race);
    expect(await overlapsIn(race)).toBeGreaterThan(0);
  });
});
