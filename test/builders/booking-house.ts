import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach } from 'vitest';
import { agentFor, type Agent } from './agent';
import { buildSite, buildUser } from './people';
import { buildBookable, buildBooker, buildClassDate } from './schedule';
import { createTestApp, type TestApp } from './test-app';

type StaffRole =
  'front-desk' | 'nurse' | 'exercise-physiologist' | 'physician' | 'administrator' | 'director';

export const book = (agent: Agent, body: object, key: string = randomUUID()) =>
  agent.post('/api/appointments').set('Idempotency-Key', key).send(body);

/** The server for a spec file about booking: each test has a site of its own, with a front desk, on 2026-12-01 at 15:00 UTC. */
export function bookingHouse() {
  let testApp: TestApp;
  let site: Awaited<ReturnType<typeof buildSite>>;
  let desk: Agent;

  beforeAll(async () => {
    testApp = await createTestApp();
  });
  afterAll(() => testApp.close());
  beforeEach(async () => {
    testApp.clock.set('2026-12-01T15:00:00Z');
    site = await buildSite(testApp.context.database);
    desk = await staff('front-desk');
  });

  async function staff(role: StaffRole, siteIds = [site.id]): Promise<Agent> {
    return agentFor(testApp, await buildUser(testApp.context.database, { roles: [role], siteIds }));
  }

  const classDate = (given: Parameters<typeof buildClassDate>[2] = {}) =>
    buildClassDate(testApp.context.database, site, given);
  const bookable = (given: Parameters<typeof buildBookable>[2] = {}) =>
    buildBookable(testApp.context.database, site, given);

  async function booker(given: Parameters<typeof buildBooker>[2] = {}) {
    const made = await buildBooker(testApp.context.database, site, given);
    return { ...made, agent: await agentFor(testApp, made.user) };
  }

  async function booked(given: Parameters<typeof buildClassDate>[2] = {}) {
    const patient = await bookable();
    const date = await classDate(given);
    const reply = await book(desk, { classDateId: date.id, patientId: patient.id }).expect(201);
    return { patient, date, appointment: reply.body as { id: string; version: number } };
  }

  async function countersOf(classDateId: string) {
    const { rows } = await testApp.context.database.$client.query<{
      booked: number;
      monitored: number;
    }>('SELECT booked, monitored_booked AS monitored FROM class_dates WHERE id = $1', [
      classDateId,
    ]);
    return rows[0];
  }

  return {
    get testApp() {
      return testApp;
    },
    get site() {
      return site;
    },
    get desk() {
      return desk;
    },
    staff,
    classDate,
    bookable,
    booker,
    booked,
    countersOf,
  };
}
