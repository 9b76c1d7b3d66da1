import { randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, beforeEach } from 'vitest';
import { agentFor, type Agent } from './agent';
import { openMailDesk, type MailDesk } from './mail-desk';
import { outboxOf } from './outbox';
import { buildSite, buildUser, type BuiltUser } from './people';
import { buildBooker, buildClassDate } from './schedule';
import { createTestApp, type TestApp } from './test-app';

const START = '2026-12-01T15:00:00Z';
/** 18:00 in New York on the day before the class of 2026-12-07. */
export const EVENING_BEFORE = '2026-12-06T23:00:00Z';

export const anAddress = (): string => `${randomUUID().slice(0, 8)}@people.example`;

/** The server for a spec file about messages, with the stand-in of a mail server; nothing is left between tests. */
export function mailHouse() {
  let mail: MailDesk;
  let testApp: TestApp;
  let site: Awaited<ReturnType<typeof buildSite>>;
  let staff: BuiltUser;

  beforeAll(async () => {
    mail = await openMailDesk();
    testApp = await createTestApp({ mailer: mail.mailer });
    site = await buildSite(testApp.context.database, { name: 'Cardiac Rehabilitation Quayside' });
    staff = await buildUser(testApp.context.database, {
      roles: ['front-desk'],
      siteIds: [site.id],
    });
  });
  afterAll(async () => {
    await testApp.close();
    await mail.close();
  });
  beforeEach(() => testApp.clock.set(START));
  afterEach(async () => {
    await mail.reset();
    await change('DELETE FROM outbox');
    await change('DELETE FROM suppressions');
  });

  const change = (sql: string, ...values: unknown[]) =>
    testApp.context.database.$client.query(sql, values);

  /** Signed in by the clock as it stands. */
  const atDesk = (): Promise<Agent> => agentFor(testApp, staff);

  async function patientWith(columns: Readonly<Record<string, string | null>> = {}) {
    const made = await buildBooker(testApp.context.database, site);
    const set = { email: anAddress(), ...columns };
    for (const [name, value] of Object.entries(set)) {
      await change(`UPDATE patients SET ${name} = $2 WHERE id = $1`, made.patient.id, value);
    }
    return { ...made, email: set.email };
  }

  async function book(
    { patient }: { patient: { id: string } },
    given: Parameters<typeof buildClassDate>[2] = {},
  ) {
    const { id } = await buildClassDate(testApp.context.database, site, given);
    const desk = await atDesk();
    const reply = await desk
      .post('/api/appointments')
      .set('Idempotency-Key', randomUUID())
      .send({ classDateId: id, patientId: patient.id })
      .expect(201);
    return reply.body as { id: string; version: number };
  }

  return {
    get mail() {
      return mail;
    },
    get testApp() {
      return testApp;
    },
    get site() {
      return site;
    },
    change,
    atDesk,
    patientWith,
    book,
    /** Somebody new, with a class that is booked. */
    booked: async () => {
      const person = await patientWith();
      return { ...person, appointment: await book(person) };
    },
    statuses: async (kind: string) =>
      (await outboxOf(testApp, kind)).map(({ status, last_error }) => [status, last_error]),
  };
}
