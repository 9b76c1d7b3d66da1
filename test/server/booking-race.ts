import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildBooker, buildClassDate, type ClassDateOptions } from '../builders/schedule';
import { startServerProcess, type ServerProcess } from '../builders/server-process';
import { createTestApp, type TestApp } from '../builders/test-app';
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

/** Takes the database's last word away, to show that the races find what it prevents. */
async function dropGuards(ownerUrl: string): Promise<void> {
  const owner = new pg.Client({ connectionString: ownerUrl });
  await owner.connect();
  await owner.query(`
    ALTER TABLE class_dates DROP CONSTRAINT class_dates_places;
    ALTER TABLE class_dates DROP CONSTRAINT class_dates_monitors;
    ALTER TABLE appointments DROP CONSTRAINT appointments_no_overlap;`);
  await owner.end();
}

export async function startRace(guarded: boolean): Promise<Race> {
  const testApp = await createTestApp({ clock: testClock(new Date().toISOString()) });
  if (!guarded) await dropGuards(testApp.testDatabase.ownerUrl);
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

export async function patientCallers({ testApp, site }: Race, count: number): Promise<Caller[]> {
  return Promise.all(
    Array.from({ length: count }, async () => {
      const { user, patient } = await buildBooker(testApp.context.database, site);
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

/** How many deadlocks PostgreSQL has broken in this database. */
export async function deadlocksIn({ testApp }: Race): Promise<number> {
  const { rows } = await testApp.context.database.$client.query<{ deadlocks: number }>(
    `SELECT pg_stat_get_db_deadlocks(oid)::int AS deadlocks FROM pg_database WHERE datname = current_database()`,
  );
  return rows[0]?.deadlocks ?? 0;
}
