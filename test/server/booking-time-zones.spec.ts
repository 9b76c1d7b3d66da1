import { randomUUID } from 'node:crypto';
import pg from 'pg';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { planClassDates } from '../../server/schedule/class-dates-service';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildBookable, buildClass } from '../builders/schedule';
import { startServerProcess } from '../builders/server-process';
import { createTestApp, type TestApp } from '../builders/test-app';
import { testClock } from '../builders/test-clock';

let testApp: TestApp;
let desk: Agent;
let paths: readonly string[];

beforeAll(async () => {
  testApp = await createTestApp({ clock: testClock(new Date().toISOString()) });
  const { database, clock } = testApp.context;
  const site = await buildSite(database, { timeZone: 'America/Los_Angeles' });
  await buildClass(database, site, { localStart: '19:30' });
  await planClassDates(database, clock.now());
  desk = await agentFor(
    testApp,
    await buildUser(database, { roles: ['front-desk'], siteIds: [site.id] }),
  );
  const patient = await buildBookable(database, site);
  const { rows } = await database.$client.query<{ id: string; localDate: string }>(
    `SELECT id, local_date::text AS "localDate" FROM class_dates ORDER BY starts_at OFFSET 5 LIMIT 1`,
  );
  const [date] = rows;
  await desk
    .post('/api/appointments')
    .set('Idempotency-Key', randomUUID())
    .send({ classDateId: date?.id, patientId: patient.id })
    .expect(201);
  const day = date?.localDate ?? '';
  const next = new Date(Date.parse(day) + 86_400_000).toISOString().slice(0, 10);
  paths = [
    `/api/class-dates?siteId=${site.id}&from=${day}&to=${next}`,
    `/api/class-dates/${date?.id}`,
    `/api/appointments?patientId=${patient.id}&from=${day}&to=${next}`,
    `/api/class-templates?siteId=${site.id}`,
  ];
});
afterAll(() => testApp.close());

async function setDatabaseZone(timeZone: string): Promise<void> {
  const owner = new pg.Client({ connectionString: testApp.testDatabase.ownerUrl });
  await owner.connect();
  const { rows } = await owner.query<{ name: string }>('SELECT current_database() AS name');
  await owner.query(`ALTER DATABASE ${rows[0]?.name} SET timezone = '${timeZone}'`);
  await owner.end();
}

async function bytesUnder(processZone: string, databaseZone: string): Promise<string[]> {
  await setDatabaseZone(databaseZone);
  const server = await startServerProcess(testApp, processZone);
  const cookie = Object.entries(desk.cookies)
    .map(([name, value]) => `${name}=${encodeURIComponent(value)}`)
    .join('; ');
  const read = async (path: string) =>
    (await fetch(server.origin + path, { headers: { cookie } })).text();
  try {
    return await Promise.all(paths.map(read));
  } finally {
    await server.stop();
  }
}

it('answers the same bytes whatever the zone of the process and of the database', async () => {
  const plain = await bytesUnder('UTC', 'UTC');
  expect(plain.every((text) => text.includes('19:30') || text.includes('"items":[{'))).toBe(true);
  expect(await bytesUnder('America/New_York', 'Pacific/Kiritimati')).toEqual(plain);
  expect(await bytesUnder('Pacific/Kiritimati', 'America/New_York')).toEqual(plain);
});
