import { afterAll, afterEach, beforeAll, expect, it } from 'vitest';
import { sendMessage } from '../../server/messages/sending-service';
import { openMailDesk, type MailDesk } from '../builders/mail-desk';
import { buildSite } from '../builders/people';
import { buildBooker, buildClassDate } from '../builders/schedule';
import { startServerProcess } from '../builders/server-process';
import { createTestApp, type TestApp } from '../builders/test-app';
import { testClock } from '../builders/test-clock';

/** `npm run soak` raises these. */
const KILLS = Number(process.env['SOAK_KILLS'] ?? 4);
const MESSAGES = Number(process.env['SOAK_MESSAGES'] ?? 400);
/** Messages that one process has under way at once. */
const AT_ONCE = 4;

let mail: MailDesk;
let testApp: TestApp;

beforeAll(async () => {
  mail = await openMailDesk();
  const clock = testClock(new Date().toISOString());
  testApp = await createTestApp({ mailer: mail.mailer, clock });
});
afterAll(async () => {
  await testApp.close();
  await mail.close();
});
afterEach(() => mail.reset());

const query = <T extends object>(sql: string, values: unknown[] = []) =>
  testApp.context.database.$client.query<T>(sql, values);

/** As many confirmations as asked for, each with its job. */
async function fill(count: number, round: string): Promise<string[]> {
  const { database } = testApp.context;
  const site = await buildSite(database);
  const { patient } = await buildBooker(database, site);
  const tomorrow = new Date(Date.now() + 48 * 3_600_000).toISOString().slice(0, 10);
  const date = await buildClassDate(database, site, { localDate: tomorrow });
  const { rows } = await query<{ id: string }>(
    `WITH booked AS (
       INSERT INTO appointments (id, patient_id, enrollment_id, class_date_id, local_date, starts_at, ends_at, created_by, monitored)
       SELECT gen_random_uuid(), p.id, e.id, d.id, d.local_date, d.starts_at, d.ends_at, p.user_id, true
         FROM patients p JOIN enrollments e ON e.patient_id = p.id, class_dates d WHERE p.id = $1 AND d.id = $2
       RETURNING id)
     INSERT INTO outbox (id, kind, dedupe_key, patient_id, subject, due_at)
     SELECT gen_random_uuid(), 'booking-confirmation', $3 || n, $1, jsonb_build_object('appointmentIds', booked.id), now() - interval '1 second'
       FROM booked, generate_series(1, $4::int) n RETURNING id`,
    [patient.id, date.id, round, count],
  );
  return rows.map(({ id }) => id);
}

async function addJobs(round: string): Promise<void> {
  await query(
    `SELECT graphile_worker.add_job('send-message', json_build_object('outboxId', id), job_key => dedupe_key)
       FROM outbox WHERE starts_with(dedupe_key, $1)`,
    [round],
  );
}

const idsCaught = async (): Promise<string[]> =>
  (await mail.caught()).map(({ messageId }) => messageId ?? '');

async function until(condition: () => Promise<boolean>): Promise<void> {
  for (let tries = 0; tries < 1200; tries += 1) {
    if (await condition()) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('It did not happen in a minute.');
}

const unsent = async (round: string): Promise<number> => {
  const { rows } = await query<{ count: number }>(
    `SELECT count(*)::int AS count FROM outbox WHERE starts_with(dedupe_key, $1) AND status <> 'sent'`,
    [round],
  );
  return rows[0]?.count ?? -1;
};

it('sends each message once, however many work at it', async () => {
  const ids = await fill(MESSAGES, 'shared-');
  testApp.clock.set(new Date().toISOString());
  const workers = [testApp, testApp.twin(), testApp.twin(), testApp.twin()];
  const started = Date.now();
  await Promise.all(
    workers.map(async (worker, shift) => {
      // All reach for the same messages, two of the four in the same order.
      const order = shift % 2 === 0 ? ids : [...ids].reverse();
      for (const id of order) await sendMessage(worker.context, id);
    }),
  );
  const seconds = (Date.now() - started) / 1000;
  await Promise.all(workers.slice(1).map((worker) => worker.close()));
  const caught = await idsCaught();
  expect(caught).toHaveLength(MESSAGES);
  expect(new Set(caught).size).toBe(MESSAGES);
  expect(await unsent('shared-')).toBe(0);
  console.log(`${MESSAGES} messages by four workers: ${Math.round(MESSAGES / seconds)} a second`);
}, 120_000);

it('loses none and repeats few when workers are killed at their work', async () => {
  const ids = await fill(KILLS * 60, 'killed-');
  await addJobs('killed-');
  const settings = { PLIMSOLL_WORKER: 'on', SMTP_URL: mail.url };
  for (let kill = 1; kill <= KILLS; kill += 1) {
    const before = (await idsCaught()).length;
    const worker = await startServerProcess(testApp, 'UTC', settings);
    await until(async () => (await idsCaught()).length > before + 5);
    await worker.kill();
    // Instead of waiting until the dead worker's hold ends.
    await query(`UPDATE outbox SET hold_until = now() WHERE status = 'sending'`);
  }
  const last = await startServerProcess(testApp, 'UTC', settings);
  await until(async () => (await unsent('killed-')) === 0);
  await last.stop();
  const caught = await idsCaught();
  const repeated = caught.length - new Set(caught).size;
  expect(new Set(caught).size).toBe(ids.length);
  expect(repeated).toBeLessThanOrEqual(KILLS * AT_ONCE);
  console.log(`${ids.length} messages, ${KILLS} kills: none missing, ${repeated} repeated`);
}, 300_000);
