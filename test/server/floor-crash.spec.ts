import { v7 as uuidv7 } from 'uuid';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { buildVisit, readingBody, recordBody } from '../builders/floor';
import { agentFor, type Agent } from '../builders/agent';
import { buildUser } from '../builders/people';
import { startServerProcess, type ServerProcess } from '../builders/server-process';
import { call, raceDate, startRace, type Race } from './booking-race';

const READINGS = 120;

let race: Race;
let nurse: Agent;
let server: ServerProcess;

beforeAll(async () => {
  race = await startRace();
  const { database } = race.testApp.context;
  const user = await buildUser(database, { roles: ['nurse'], siteIds: [race.site.id] });
  nurse = await agentFor(race.testApp, user);
});
afterAll(async () => {
  await server.stop();
  await race.close();
});

interface Sent {
  readonly id: string;
  readonly body: object;
}

/** A write to one server; null when no answer came, which tells nothing of whether it was stored. */
async function send({ id, body }: Sent): Promise<number | null> {
  const only = { ...race, servers: [server] };
  const request = { method: 'PUT', path: `/api/vital-signs/${id}`, body };
  const answer = await call(only, 0, nurse, request).catch(() => null);
  return answer?.status ?? null;
}

/** Six tablets write on, each one reading after the other, until all have been tried. */
async function writeAll(
  readings: readonly Sent[],
  onAnswer: (sent: Sent, status: number | null) => void,
) {
  const waiting = [...readings];
  const tablet = async (): Promise<void> => {
    for (let next = waiting.shift(); next; next = waiting.shift()) onAnswer(next, await send(next));
  };
  await Promise.all(Array.from({ length: 6 }, tablet));
}

it('a server killed in the middle of a class loses no reading that it acknowledged, and doubles none', async () => {
  const { database } = race.testApp.context;
  server = await startServerProcess(race.testApp);
  const { appointment } = await buildVisit(database, race.site, await raceDate(race));
  const recordId = uuidv7();
  const begun = await call({ ...race, servers: [server] }, 0, nurse, {
    method: 'PUT',
    path: `/api/session-records/${recordId}`,
    body: recordBody(appointment.id),
  });
  expect(begun.status).toBe(201);

  const readings = Array.from({ length: READINGS }, (_, each) => ({
    id: uuidv7(),
    body: readingBody(recordId, { heartRate: 60 + each }),
  }));
  const acknowledged = new Set<string>();
  const unanswered: Sent[] = [];
  let killed: Promise<unknown> | undefined;
  await writeAll(readings, (sent, status) => {
    if (status === 201) acknowledged.add(sent.id);
    else unanswered.push(sent);
    if (acknowledged.size === READINGS / 3) killed ??= server.kill();
  });
  await killed;
  expect(unanswered.length).toBeGreaterThan(0);

  server = await startServerProcess(race.testApp);
  await writeAll(unanswered, (_, status) => expect([200, 201]).toContain(status));
  await writeAll(readings, (_, status) => expect(status).toBe(200));
  const { rows } = await database.$client.query<{ id: string; heart_rate: number }>(
    'SELECT id, heart_rate FROM vital_signs WHERE session_record_id = $1 ORDER BY heart_rate',
    [recordId],
  );
  expect(rows.map(({ id }) => id)).toEqual(readings.map(({ id }) => id));
});
