import { randomUUID } from 'node:crypto';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildBooker, buildClassDate, type ClassDateOptions } from '../builders/schedule';
import { startServerProcess, type ServerProcess } from '../builders/server-process';
import { createTestApp, type TestApp } from '../builders/test-app';
import { takeAway } from '../builders/take-away';
import { testClock } from '../builders/test-clock';

/** Two server processes on one database of their own, and whoever calls them over HTTP. */
export interface Race {
  readonly testApp: TestApp;
  readonly site: { readonly id: string; readonly timeZone: string };
  readonly servers: readonly ServerProcess[];
  readonly close: () => Promise<void>;
}

export interface Caller {
  readonly patientId: string;
  readonly agent: Agent;
}

export interface Answer {
  readonly status: number;
  readonly body: { readonly id?: string; readonly code?: string };
}

/** A week ahead of the real clock, by which the processes go. */
export const raceDay = new Date(Date.now() + 7 * 86_400_000).toISOString().slice(0, 10);

/** @param without takes a guard of the database away, to show that the race finds what it prevents */
export async function startRace(without?: string): Promise<Race> {
  const testApp = await createTestApp({ clock: testClock(new Date().toISOString()) });
  if (without) await takeAway(testApp, without);
  const servers = await Promise.all([startServerProcess(testApp), startServerProcess(testApp)]);
  return {
    testApp,
    site: await buildSite(testApp.context.database),
    servers,
    close: async () => {
      await Promise.all(servers.map((server) => server.stop()));
      await testApp.close();
    },
  };
}

export const raceDate = ({ testApp, site }: Race, given: ClassDateOptions = {}) =>
  buildClassDate(testApp.context.database, site, { localDate: raceDay, ...given });

export async function patientCallers(
  { testApp, site }: Race,
  count: number,
  course: Parameters<typeof buildBooker>[2] = {},
): Promise<Caller[]> {
  return Promise.all(
    Array.from({ length: count }, async () => {
      const { user, patient } = await buildBooker(testApp.context.database, site, course);
      return { patientId: patient.id, agent: await agentFor(testApp, user) };
    }),
  );
}

export async function deskCaller({ testApp, site }: Race): Promise<Agent> {
  const user = await buildUser(testApp.context.database, {
    roles: ['front-desk'],
    siteIds: [site.id],
  });
  return agentFor(testApp, user);
}

/** A write over real HTTP, to one process or the other in turn. */
export async function call(
  race: Race,
  turn: number,
  agent: Agent,
  request: {
    readonly method?: string;
    readonly path: string;
    readonly body: object;
    readonly key?: string;
  },
): Promise<Answer> {
  const { origin } = race.servers[turn % race.servers.length] as ServerProcess;
  const cookie = Object.entries(agent.cookies)
    .map(([name, value]) => `${name}=${encodeURIComponent(value)}`)
    .join('; ');
  const reply = await fetch(origin + request.path, {
    method: request.method ?? 'POST',
    headers: {
      cookie,
      'content-type': 'application/json',
      'x-xsrf-token': agent.cookies['XSRF-TOKEN'] ?? '',
      'idempotency-key': request.key ?? randomUUID(),
    },
    body: JSON.stringify(request.body),
  });
  return { status: reply.status, body: (await reply.json()) as Answer['body'] };
}

export const bookOver = (
  race: Race,
  turn: number,
  agent: Agent,
  classDateId: string,
  key?: string,
) =>
  call(race, turn, agent, {
    path: '/api/appointments',
    body: { classDateId },
    ...(key && { key }),
  });

const HOLDS = `status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow')`;

/** How many appointments hold a place in a class date, by its rows. */
export async function heldIn({ testApp }: Race, classDateId: string): Promise<number> {
  const { rows } = await testApp.context.database.$client.query<{ held: number }>(
    `SELECT count(*)::int AS held FROM appointments WHERE class_date_id = $1 AND ${HOLDS}`,
    [classDateId],
  );
  return rows[0]?.held ?? 0;
}

/** How many pairs of appointments put one patient in two places at once. */
export async function overlapsIn({ testApp }: Race): Promise<number> {
  const { rows } = await testApp.context.database.$client.query<{ pairs: number }>(
    `SELECT count(*)::int AS pairs FROM appointments a JOIN appointments b
       ON a.patient_id = b.patient_id AND a.id < b.id AND a.during && b.during
      WHERE a.${HOLDS} AND b.${HOLDS}`,
  );
  return rows[0]?.pairs ?? 0;
}

/**
 * How many deadlocks PostgreSQL broke in all of the race. It ends the servers: a connection tells its counts when it
 * closes, and until then keeps them for up to ten seconds.
 */
export async function deadlocksOf({ servers, testApp }: Race): Promise<number> {
  await Promise.all(servers.map((server) => server.stop()));
  const pool = testApp.context.database.$client;
  for (let tries = 0; tries < 100; tries += 1) {
    const { rows } = await pool.query<{ open: number; deadlocks: number }>(
      `SELECT pg_stat_get_db_deadlocks(oid)::int AS deadlocks, (SELECT count(*)::int FROM pg_stat_activity a WHERE a.datid = d.oid) AS open
         FROM pg_database d WHERE datname = current_database()`,
    );
    const [found] = rows;
    if (found && found.open <= pool.totalCount) return found.deadlocks;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('The servers’ connections did not close');
}
