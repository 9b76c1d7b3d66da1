import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { counterDifferences } from '../../server/schedule/counters-service';
import { startServerProcess } from '../builders/server-process';
import type { Agent } from '../builders/agent';
import { call, deskCaller, patientCallers, raceDate, startRace, type Race } from './booking-race';

/** Longer runs raise this. */
const KILLS = Number(process.env['SOAK_KILLS'] ?? 2);
const SERIES = 12;

let race: Race;
beforeAll(async () => {
  race = await startRace();
});
afterAll(() => race.close());

interface Wish {
  readonly patientId: string;
  readonly classDateIds: readonly string[];
  readonly key: string;
}

interface Told {
  readonly wish: Wish;
  /** The ids of the appointments; null when no answer came, which tells nothing of whether they stand. */
  readonly booked: readonly string[] | null;
}

async function ask(desk: Agent, wish: Wish, server: number): Promise<Told> {
  const { key, ...body } = wish;
  const request = { path: '/api/appointments/series', body, key };
  const answer = await call(race, server, desk, request).catch(() => null);
  if (answer === null) return { wish, booked: null };
  expect(answer.status).toBe(201);
  const { items } = answer.body as { items: { id: string }[] };
  return { wish, booked: items.map(({ id }) => id) };
}

async function wishesFor(round: number): Promise<Wish[]> {
  const classDateIds: string[] = [];
  for (let day = 0; day < SERIES; day += 1) {
    const at = new Date(Date.now() + (10 + day + round * SERIES) * 86_400_000);
    const localDate = at.toISOString().slice(0, 10);
    classDateIds.push((await raceDate(race, { localDate, capacity: 40 })).id);
  }
  const callers = await patientCallers(race, 20);
  return callers.map(({ patientId }) => ({ patientId, classDateIds, key: randomUUID() }));
}

const idsOf = async ({ patientId, classDateIds }: Wish): Promise<string[]> => {
  const { rows } = await race.testApp.context.database.$client.query<{ id: string }>(
    `SELECT id FROM appointments WHERE patient_id = $1 AND class_date_id = ANY ($2) AND status = 'booked'`,
    [patientId, classDateIds],
  );
  return rows.map(({ id }) => id).sort();
};

it('a server killed while series are booked loses none that it acknowledged, halves none and doubles none', async () => {
  const desk = await deskCaller(race);
  for (let kill = 0; kill < KILLS; kill += 1) {
    const wishes = await wishesFor(kill);
    const doomed = await startServerProcess(race.testApp);
    race = { ...race, servers: [...race.servers.slice(0, 2), doomed] };
    let acknowledged = 0;
    let killed: Promise<unknown> | undefined;
    const told = await Promise.all(
      wishes.map(async (wish) => {
        const outcome = await ask(desk, wish, 2);
        acknowledged += outcome.booked ? 1 : 0;
        if (acknowledged === 4) killed ??= doomed.kill();
        return outcome;
      }),
    );
    await killed;
    const lost = told.filter(({ booked }) => booked === null);
    expect(lost.length).toBeGreaterThan(0);

    for (const { wish, booked } of told) {
      const standing = await idsOf(wish);
      if (booked) expect(standing).toEqual([...booked].sort());
      else expect([0, SERIES]).toContain(standing.length);
      // Asked again with the same key, through a server that lives.
      const again = await ask(desk, wish, 0);
      if (booked) expect(again.booked).toEqual(booked);
      expect(await idsOf(wish)).toEqual([...(again.booked ?? [])].sort());
    }
  }
  expect(await counterDifferences(race.testApp.context.database)).toEqual([]);
}, 120_000);
