import { randomUUID } from 'node:crypto';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { inTransaction } from '../../server/database/transaction';
import { enqueueMessage } from '../../server/messages/messages-service';
import { sendMessage, waitAfter } from '../../server/messages/sending-service';
import { agentFor, type Agent } from '../builders/agent';
import { openMailDesk, type MailDesk } from '../builders/mail-desk';
import { outboxOf, sendDue } from '../builders/outbox';
import { buildSite, buildUser, type BuiltUser } from '../builders/people';
import { buildBooker, buildClassDate } from '../builders/schedule';
import { createTestApp, type TestApp } from '../builders/test-app';
import { hours, minutes } from '../builders/test-clock';

const START = '2026-12-01T15:00:00Z';
/** 18:00 in New York on the day before the class of 2026-12-07. */
const EVENING_BEFORE = '2026-12-06T23:00:00Z';

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
  await testApp.context.database.$client.query('DELETE FROM outbox; DELETE FROM suppressions');
});

/** Signed in by the clock as it stands. */
const atDesk = (): Promise<Agent> => agentFor(testApp, staff);

const address = (): string => `${randomUUID().slice(0, 8)}@people.example`;

async function patientWith(columns: Readonly<Record<string, string | null>> = {}) {
  const made = await buildBooker(testApp.context.database, site);
  const email = address();
  const set = { email, ...columns };
  for (const [name, value] of Object.entries(set)) {
    await testApp.context.database.$client.query(`UPDATE patients SET ${name} = $2 WHERE id = $1`, [
      made.patient.id,
      value,
    ]);
  }
  return { ...made, email: set.email };
}

async function book(
  { patient }: { patient: { id: string } },
  given: Parameters<typeof buildClassDate>[2] = {},
) {
  const { id } = await buildClassDate(testApp.context.database, site, given);
  const reply = await (
    await atDesk()
  )
    .post('/api/appointments')
    .set('Idempotency-Key', randomUUID())
    .send({ classDateId: id, patientId: patient.id })
    .expect(201);
  return reply.body as { id: string; version: number };
}

const change = (sql: string, ...values: unknown[]) =>
  testApp.context.database.$client.query(sql, values);

const statuses = async (kind: string) =>
  (await outboxOf(testApp, kind)).map(({ status, last_error }) => [status, last_error]);

describe('what a booking tells', () => {
  it('writes confirmation and reminder with the booking, each with its job', async () => {
    await book(await patientWith());
    const rows = await outboxOf(testApp);
    expect(rows.map(({ kind, due_at }) => [kind, due_at.toISOString()])).toEqual([
      ['booking-confirmation', '2026-12-01T15:00:00.000Z'],
      ['reminder', '2026-12-06T23:00:00.000Z'],
    ]);
    const jobs = await change(
      'SELECT count(*)::int AS count FROM graphile_worker.jobs WHERE key = ANY ($1)',
      rows.map(({ dedupe_key }) => dedupe_key),
    );
    expect(jobs.rows[0].count).toBe(2);
  });

  it('writes nothing when the booking is undone', async () => {
    const { patient } = await patientWith();
    const undone = inTransaction(testApp.context.database, async (tx) => {
      const about = { kind: 'reminder', dedupeKey: 'undone', patientId: patient.id } as const;
      await enqueueMessage(tx, { ...about, subject: {}, dueAt: testApp.clock.now() });
      throw new Error('the booking failed');
    });
    await expect(undone).rejects.toThrow('the booking failed');
    expect(await outboxOf(testApp)).toEqual([]);
    const jobs = await change(`SELECT FROM graphile_worker.jobs WHERE key = 'undone'`);
    expect(jobs.rowCount).toBe(0);
  });

  it('writes one message for one key', async () => {
    const { patient } = await patientWith();
    const about = { kind: 'reminder', dedupeKey: 'once', patientId: patient.id } as const;
    const message = { ...about, subject: {}, dueAt: testApp.clock.now() };
    await Promise.all(
      Array.from({ length: 8 }, () =>
        inTransaction(testApp.context.database, (tx) => enqueueMessage(tx, message)),
      ),
    );
    expect(await outboxOf(testApp)).toHaveLength(1);
  });

  it('reminds in the evening of the patient’s own zone', async () => {
    await book(await patientWith({ time_zone: 'America/Los_Angeles' }));
    const [row] = await outboxOf(testApp, 'reminder');
    expect(row?.due_at.toISOString()).toBe('2026-12-07T02:00:00.000Z');
  });

  it('reminds of nothing that was booked after that evening', async () => {
    testApp.clock.set('2026-12-06T23:00:00Z');
    await book(await patientWith());
    expect(await outboxOf(testApp, 'reminder')).toEqual([]);
  });

  it('tells time, place and the last moment to cancel, and says it once', async () => {
    const { email } = await book0();
    await sendDue(testApp);
    await sendDue(testApp);
    const [message, ...more] = await mail.caught(email);
    expect(more).toEqual([]);
    expect(message?.subject).toBe('Your appointment on December 7 is booked');
    expect(message?.text).toContain('Monday, December 7, 2026, 9:00 AM to 10:00 AM Eastern');
    expect(message?.text).toContain('1 Wharf Road');
    expect(message?.text).toContain('before Sunday, December 6, 2026 at 9:00 AM');
    expect(message?.text).toContain('http://127.0.0.1:3000/my/sessions');
    expect(await statuses('booking-confirmation')).toEqual([['sent', null]]);
  });
});

async function book0() {
  const person = await patientWith();
  const appointment = await book(person);
  return { ...person, appointment };
}

describe('what is true when it is sent', () => {
  it('says nothing of a place that was given back, and tells that it was', async () => {
    const { appointment, email } = await book0();
    await (
      await atDesk()
    )
      .patch(`/api/appointments/${appointment.id}`)
      .send({ status: 'cancelled', version: appointment.version })
      .expect(200);
    testApp.clock.set(EVENING_BEFORE);
    await sendDue(testApp);
    expect((await mail.caught(email)).map(({ subject }) => subject)).toEqual([
      'Your appointment on December 7 is cancelled',
    ]);
    expect(await statuses('reminder')).toEqual([['cancelled', 'withdrawn']]);
    expect(await statuses('booking-confirmation')).toEqual([['cancelled', 'overtaken']]);
  });

  it('reads the place again, whoever took it back', async () => {
    const { appointment, email } = await book0();
    await change(`UPDATE appointments SET status = 'cancelled' WHERE id = $1`, appointment.id);
    testApp.clock.set(EVENING_BEFORE);
    await sendDue(testApp);
    expect(await mail.caught(email)).toEqual([]);
  });

  it('waits for the evening before the day to which a class was moved', async () => {
    const { appointment, email } = await book0();
    await change(
      `UPDATE appointments SET starts_at = starts_at + interval '2 days', ends_at = ends_at + interval '2 days' WHERE id = $1`,
      appointment.id,
    );
    await change(`UPDATE outbox SET status = 'sent' WHERE kind <> 'reminder'`);
    testApp.clock.set(EVENING_BEFORE);
    await sendDue(testApp);
    expect(await mail.caught(email)).toEqual([]);
    testApp.clock.advance(hours(48));
    await sendDue(testApp);
    expect((await mail.caught(email)).map(({ subject }) => subject)).toEqual([
      'Your appointment on December 9',
    ]);
  });

  it('reminds of nothing that has begun', async () => {
    const { email } = await book0();
    testApp.clock.set('2026-12-07T14:00:00Z');
    await sendDue(testApp);
    expect(await mail.caught(email)).toEqual([]);
    expect(await statuses('reminder')).toEqual([['cancelled', 'overtaken']]);
  });
});

describe('a mail server that fails', () => {
  it('is asked again later, ever later', async () => {
    const { email } = await book0();
    await mail.faults({ kind: 'refuse-recipient', code: 450 });
    await sendDue(testApp);
    const [row] = await outboxOf(testApp, 'booking-confirmation');
    expect(row?.status).toBe('pending');
    const wait = (row?.hold_until?.getTime() ?? 0) - testApp.clock.now().getTime();
    expect(wait).toBeGreaterThanOrEqual(45_000);
    expect(wait).toBeLessThanOrEqual(75_000);
    await sendDue(testApp);
    expect(await mail.caught(email)).toEqual([]);
    testApp.clock.advance(minutes(2));
    await sendDue(testApp);
    expect(await mail.caught(email)).toHaveLength(1);
    expect([1, 2, 3, 4, 5, 9].map((tries) => waitAfter(tries, 0.5) / 60_000)).toEqual([
      1, 2, 4, 8, 15, 15,
    ]);
  });

  it('is given up after two days, and the desk sees it', async () => {
    await book0();
    testApp.clock.advance(hours(49));
    await mail.faults({ kind: 'refuse-recipient', code: 450 });
    await sendDue(testApp);
    expect(await statuses('booking-confirmation')).toEqual([['failed', 'not-reached']]);
  });

  it('that hangs up after the message leaves it uncertain, and the repeat can be told as one', async () => {
    await book0();
    await mail.faults({ kind: 'drop-after-message', keep: true });
    await sendDue(testApp);
    expect((await outboxOf(testApp, 'booking-confirmation'))[0]?.status).toBe('uncertain');
    testApp.clock.advance(minutes(2));
    await sendDue(testApp);
    expect(await statuses('booking-confirmation')).toEqual([['sent', null]]);
    const messages = await mail.caught();
    expect(messages).toHaveLength(2);
    expect(new Set(messages.map(({ messageId }) => messageId)).size).toBe(1);
  });

  it('sends one more a drop at most, over many', async () => {
    const person = await patientWith();
    const { rows } = await change(
      `INSERT INTO outbox (id, kind, dedupe_key, patient_id, subject, due_at)
       SELECT gen_random_uuid(), 'booking-confirmation', 'many-' || n, $1, $2, $3 FROM generate_series(1, 40) n RETURNING id`,
      person.patient.id,
      { appointmentIds: (await book(person)).id },
      testApp.clock.now(),
    );
    await mail.faults({ kind: 'drop-after-message', keep: true }, 20);
    await mail.faults({ kind: 'drop-after-message', keep: false }, 20);
    for (const { id } of rows) await sendMessage(testApp.context, id);
    testApp.clock.advance(minutes(2));
    for (const { id } of rows) await sendMessage(testApp.context, id);
    const messages = await mail.caught();
    const ids = messages.map(({ messageId }) => messageId);
    expect(new Set(ids).size).toBe(40);
    expect(ids.length).toBeLessThanOrEqual(60);
  });

  it('that knows no such person is asked no second time, and the desk is told to call', async () => {
    const person = await patientWith({ phone: '555-0123' });
    await book(person);
    await mail.faults({ kind: 'refuse-recipient', code: 550 });
    await sendDue(testApp);
    testApp.clock.set(EVENING_BEFORE);
    await sendDue(testApp);
    expect(await mail.caught(person.email)).toEqual([]);
    const { body } = await (await atDesk()).post('/api/messages/undelivered').send({}).expect(200);
    const told = (body as { items: Record<string, unknown>[] }).items;
    expect(told.map(({ kind, reason, phone }) => [kind, reason, phone])).toEqual([
      ['reminder', 'address-refused-before', '555-0123'],
      ['booking-confirmation', 'address-refused', '555-0123'],
    ]);
  });

  it('is not asked for a patient without an address, and the desk sees it', async () => {
    const person = await patientWith({ email: null });
    await change('UPDATE patients SET user_id = NULL WHERE id = $1', person.patient.id);
    await book(person);
    await sendDue(testApp);
    expect(await statuses('booking-confirmation')).toEqual([['cancelled', 'no-address']]);
    const { body } = await (
      await atDesk()
    )
      .post('/api/messages/undelivered')
      .send({ limit: 1 })
      .expect(200);
    const told = (body as { items: { recordNumber: string }[] }).items;
    expect(told.map(({ recordNumber }) => recordNumber)).toEqual([person.patient.recordNumber]);
  });
});

/** What would tell a stranger who sees an inbox what kind of care it is; words of the product's own field. */
const telling =
  /cardi|heart|rehab|exercis|therap|patient|clinic|medic|physio|nurse|diagnos|blood|pulse|\bbpm\b|session record|\bHL-/i;

describe('what a stranger may read', () => {
  it('tells no kind of care, in no part of any message', async () => {
    const { appointment, patient, email } = await book0();
    await sendDue(testApp);
    testApp.clock.set(EVENING_BEFORE);
    await sendDue(testApp);
    await (
      await atDesk()
    )
      .patch(`/api/appointments/${appointment.id}`)
      .send({ status: 'cancelled', version: appointment.version })
      .expect(200);
    await sendDue(testApp);
    const messages = await mail.caught(email);
    expect(messages).toHaveLength(3);
    for (const { id, subject, text, html, headers } of messages) {
      const readable = [subject, text, html ?? '', JSON.stringify(headers), await mail.raw(id)];
      for (const part of readable) {
        expect(part).not.toMatch(telling);
        expect(part).not.toContain(patient.recordNumber);
        expect(part).not.toContain(patient.familyName);
      }
    }
  });

  it.each([
    ['line breaks', 'Ann\r\nBcc: thief@evil.example\r\n\r\nHello'],
    ['an emoji', 'Zoë 👩‍👩‍👧'],
    ['a script from right to left', 'رقية \u202Etxt'],
    ['markup', '<img src=x onerror=alert(1)>{{senderName}}'],
    ['a thousand letters', 'a'.repeat(1000)],
  ])('goes to one address, whole, with a name of %s', async (_, givenName) => {
    const person = await patientWith({ given_name: givenName });
    await book(person);
    await sendDue(testApp);
    const messages = await mail.caught();
    expect(messages).toHaveLength(1);
    const [message] = messages;
    expect(message?.envelope.recipients).toEqual([person.email]);
    expect(message?.headers.filter(({ name }) => name === 'bcc')).toEqual([]);
    expect(message?.text).toContain('Monday, December 7, 2026');
    expect(message?.html).toContain('Monday, December 7, 2026');
    expect(message?.html).not.toMatch(/<img/i);
  });
});

describe('links to an account', () => {
  it('are made when the message is sent, kept as a hash and good once', async () => {
    const administrator = await buildUser(testApp.context.database, { roles: ['administrator'] });
    const admin = await agentFor(testApp, administrator);
    const email = address();
    await admin
      .post('/api/users')
      .send({ email, displayName: 'Rosa Ferry', roles: ['nurse'], siteIds: [site.id] })
      .expect(201);
    const before = await change(`SELECT FROM user_tokens WHERE purpose = 'invitation'`);
    expect(before.rowCount).toBe(0);
    await sendDue(testApp);
    const [message] = await mail.caught(email);
    const token = /#token=([\w-]{43})/.exec(message?.text ?? '')?.[1] ?? '';
    expect(token).not.toBe('');
    const kept = await change('SELECT token_hash FROM user_tokens');
    expect(JSON.stringify(kept.rows)).not.toContain(token);
    const password = 'a long rope with three knots';
    await (await atDesk()).post('/api/auth/password').send({ token, password }).expect(204);
    await (await atDesk()).post('/api/auth/password').send({ token, password }).expect(410);
  });
});
