import { randomUUID } from 'node:crypto';
import fc from 'fast-check';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction } from '../../server/database/transaction';
import { counterDifferences } from '../../server/schedule/counters-service';
import { scheduleJobs } from '../../server/schedule/schedule-jobs';
import { fulfilAppointment } from '../../server/schedule/transition-service';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser, type BuiltUser } from '../builders/people';
import { buildBookable, buildClassDate } from '../builders/schedule';
import { takeAway } from '../builders/take-away';
import { createTestApp, type TestApp } from '../builders/test-app';

let testApp: TestApp;
let site: Awaited<ReturnType<typeof buildSite>>;
let nurse: Agent;
let nurseUser: BuiltUser;
let administrator: Agent;

beforeAll(async () => {
  testApp = await createTestApp();
  const { database } = testApp.context;
  site = await buildSite(database);
  nurseUser = await buildUser(database, { roles: ['nurse'], siteIds: [site.id] });
  nurse = await agentFor(testApp, nurseUser);
  const one = await buildUser(database, { roles: ['administrator'], siteIds: [site.id] });
  administrator = await agentFor(testApp, one);
});
afterAll(() => testApp.close());

const query = <T extends object>(text: string, values: unknown[] = []) =>
  testApp.context.database.$client.query<T>(text, values);

/** Classes that overlap and follow each other over three days, small enough to fill. */
async function world() {
  const { database } = testApp.context;
  const dates: string[] = [];
  for (const localDate of ['2026-12-07', '2026-12-08', '2026-12-09']) {
    for (const localStart of ['09:00', '09:30', '14:00']) {
      const given = { localDate, localStart, capacity: 2, monitoredCapacity: 1 };
      dates.push((await buildClassDate(database, site, given)).id);
    }
  }
  const patients: string[] = [];
  for (const monitored of [true, true, false, false]) {
    patients.push((await buildBookable(database, site, { monitored, sessionLimit: 4 })).id);
  }
  return { dates, patients };
}

type World = Awaited<ReturnType<typeof world>>;

interface Step {
  readonly kind: 'book' | 'series' | 'status' | 'fulfil' | 'strike' | 'close';
  readonly patient: number;
  readonly date: number;
  readonly status: string;
  readonly exercised: boolean;
}

const steps = fc.array(
  fc.record<Step>({
    kind: fc.constantFrom(
      'book',
      'book',
      'book',
      'series',
      'status',
      'status',
      'status',
      'fulfil',
      'strike',
      'close',
    ),
    patient: fc.nat(3),
    date: fc.nat(8),
    status: fc.constantFrom('arrived', 'checked-in', 'cancelled', 'noshow', 'booked'),
    exercised: fc.boolean(),
  }),
  { minLength: 20, maxLength: 60 },
);

const post = (path: string, body: object) =>
  nurse.post(path).set('Idempotency-Key', randomUUID()).send(body);

/** The appointment that a step is about: any of the patient, picked by the step's number. */
async function picked(patientId: string, number: number) {
  const { rows } = await query<{ id: string; version: number }>(
    'SELECT id, version FROM appointments WHERE patient_id = $1 ORDER BY id',
    [patientId],
  );
  return rows[number % Math.max(rows.length, 1)];
}

async function closeOrOpen(classDateId: string) {
  await query(
    `UPDATE class_dates SET status = (CASE status WHEN 'closed' THEN 'scheduled' ELSE 'closed' END)::class_date_status
      WHERE id = $1`,
    [classDateId],
  );
}

async function fulfil(id: string, exercised: boolean) {
  const by = { actor: nurseUser, now: testApp.clock.now() };
  await inTransaction(testApp.context.database, (tx) =>
    fulfilAppointment(tx, by, id, { exercised }),
  );
}

/** Takes one step. @returns the status of the answer, 0 when nothing was asked */
async function take({ dates, patients }: World, step: Step): Promise<number> {
  const patientId = patients[step.patient] as string;
  const classDateId = dates[step.date] as string;
  if (step.kind === 'close') return closeOrOpen(classDateId).then(() => 0);
  if (step.kind === 'book') {
    return (await post('/api/appointments', { classDateId, patientId })).status;
  }
  if (step.kind === 'series') {
    const classDateIds = [classDateId, dates[(step.date + 4) % 9] as string];
    return (await post('/api/appointments/series', { classDateIds, patientId })).status;
  }
  const appointment = await picked(patientId, step.date);
  if (appointment === undefined) return 0;
  const { id, version } = appointment;
  if (step.kind === 'fulfil') return fulfil(id, step.exercised).then(() => 0);
  const [agent, status] =
    step.kind === 'strike' ? [administrator, 'entered-in-error'] : [nurse, step.status];
  return (await agent.patch(`/api/appointments/${id}`).send({ status, version })).status;
}

/** Whether counters are what the appointments say after anything that can happen to them. */
const countersHold = fc.asyncProperty(steps, async (taken) => {
  const made = await world();
  for (const step of taken) expect([0, 200, 201, 409]).toContain(await take(made, step));
  expect(await counterDifferences(testApp.context.database)).toEqual([]);
});

describe('counters of places', () => {
  it('are what the appointments say after anything that can happen to them', async () => {
    await fc.assert(countersHold, { numRuns: 12 });
  });

  it('are proved each night: a difference is logged and kept in the audit', async () => {
    const job = scheduleJobs.find(({ name }) => name === 'prove-counters');
    await job?.run({}, testApp.context);
    const audited = () =>
      query<{ details: unknown }>(
        `SELECT details FROM audit_events WHERE action = 'counters.differ'`,
      );
    expect((await audited()).rows).toEqual([]);
    const { dates } = await world();
    await query('UPDATE class_dates SET booked = 1 WHERE id = $1', [dates[0]]);
    await job?.run({}, testApp.context);
    const difference = { counter: 'class_dates.booked', id: dates[0], kept: 1, counted: 0 };
    expect((await audited()).rows).toEqual([{ details: { differences: [difference] } }]);
    expect(testApp.logged()).toContainEqual(
      expect.objectContaining({ level: 50, differences: [difference] }),
    );
    await query('UPDATE class_dates SET booked = 0 WHERE id = $1', [dates[0]]);
  });

  it('differ when the trigger that counts misses cancellations', async () => {
    expect(await counterDifferences(testApp.context.database)).toEqual([]);
    await takeAway(
      testApp,
      `DROP TRIGGER appointments_count ON appointments;
       CREATE TRIGGER appointments_count AFTER INSERT OR DELETE ON appointments
         FOR EACH ROW EXECUTE FUNCTION appointments_count();`,
    );
    const { failed } = await fc.check(countersHold, { numRuns: 12, endOnFailure: true });
    expect(failed).toBe(true);
  });
});
