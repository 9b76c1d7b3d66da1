import { randomUUID } from 'node:crypto';
import request from 'supertest';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ReadMessage } from '../../server/fakes/mail/read-message';
import { inTransaction } from '../../server/database/transaction';
import { enqueueMessage } from '../../server/messages/messages-service';
import { forgetOldLinks } from '../../server/messages/preferences-service';
import { agentFor } from '../builders/agent';
import { openMailDesk, type MailDesk } from '../builders/mail-desk';
import { outboxOf, sendDue } from '../builders/outbox';
import { buildSite, buildUser } from '../builders/people';
import { buildBooker, buildClassDate } from '../builders/schedule';
import { createTestApp, type TestApp } from '../builders/test-app';

const START = '2026-12-01T15:00:00Z';
const ONE_CLICK = 'List-Unsubscribe=One-Click';
const FORM = 'application/x-www-form-urlencoded';

let mail: MailDesk;
let testApp: TestApp;
let site: Awaited<ReturnType<typeof buildSite>>;

beforeAll(async () => {
  mail = await openMailDesk();
  testApp = await createTestApp({ mailer: mail.mailer });
  site = await buildSite(testApp.context.database);
});
afterAll(async () => {
  await testApp.close();
  await mail.close();
});
beforeEach(() => testApp.clock.set(START));
afterEach(async () => {
  await mail.reset();
  await testApp.context.database.$client.query('DELETE FROM outbox');
});

/** A patient with a mailbox of their own, signed in. */
async function buildReader() {
  const { user, patient } = await buildBooker(testApp.context.database, site);
  const email = `${randomUUID().slice(0, 8)}@people.example`;
  await testApp.context.database.$client.query('UPDATE patients SET email = $2 WHERE id = $1', [
    patient.id,
    email,
  ]);
  return { user, patient, email };
}
type Reader = Awaited<ReturnType<typeof buildReader>>;

const signedIn = ({ user }: Reader) => agentFor(testApp, user);

async function book(reader: Reader, localDate: string): Promise<void> {
  const { id } = await buildClassDate(testApp.context.database, site, { localDate });
  const browser = await signedIn(reader);
  const booking = browser.post('/api/appointments').set('Idempotency-Key', randomUUID());
  await booking.send({ classDateId: id }).expect(201);
}

/** What reached the mailbox by the evening before a class. */
async function remindersBy(evening: string, { email }: Reader): Promise<ReadMessage[]> {
  testApp.clock.set(evening);
  await sendDue(testApp);
  const all = await mail.caught(email);
  return all.filter(({ subject }) => !subject.includes('booked'));
}

const header = ({ headers }: ReadMessage, name: string): string =>
  headers.find((field) => field.name === name)?.value ?? '';

const pathIn = (message: ReadMessage): string =>
  new URL(header(message, 'list-unsubscribe').replace(/^<|>$/g, '')).pathname;

/** As a mail program does: no cookie, no token of ours. */
const press = (path: string, body = ONE_CLICK, type = FORM) =>
  request(testApp.app).post(path).set('Content-Type', type).send(body);

const CLASS = '2026-12-07';
const NEXT_CLASS = '2026-12-10';
const EVENING = '2026-12-06T23:00:00Z';
const NEXT_EVENING = '2026-12-09T23:00:00Z';

async function reminded(): Promise<{ reader: Reader; message: ReadMessage }> {
  const reader = await buildReader();
  await book(reader, CLASS);
  await book(reader, NEXT_CLASS);
  const [message] = await remindersBy(EVENING, reader);
  if (!message) throw new Error('No reminder came');
  return { reader, message };
}

describe('a reminder', () => {
  it('carries both header fields of RFC 8058, and a link to the page that asks', async () => {
    const { message } = await reminded();
    expect(header(message, 'list-unsubscribe')).toMatch(
      /^<http:\/\/127\.0\.0\.1:3000\/api\/unsubscribe\/[\w-]{43}>$/,
    );
    expect(header(message, 'list-unsubscribe-post')).toBe(ONE_CLICK);
    const page = pathIn(message).replace('/api', '');
    expect(message.text).toContain(`Stop these reminders:\nhttp://127.0.0.1:3000${page}`);
    const { headers } = await request(testApp.app).get(pathIn(message)).expect(303);
    expect(headers['location']).toBe(`http://127.0.0.1:3000${page}`);
  });

  it('alone does: what was booked is told without them', async () => {
    const { reader } = await reminded();
    const [confirmation] = (await mail.caught(reader.email)).filter(({ subject }) =>
      subject.includes('booked'),
    );
    expect(confirmation).toBeDefined();
    expect(confirmation && header(confirmation, 'list-unsubscribe')).toBe('');
  });

  it('keeps only a hash of its secret, and none of it in the log', async () => {
    const { message } = await reminded();
    const [token = ''] = pathIn(message).match(/[\w-]{43}/) ?? [];
    await press(pathIn(message)).expect(204);
    const { rows } = await testApp.context.database.$client.query(
      'SELECT t::text FROM unsubscribe_links t',
    );
    expect(JSON.stringify(rows)).not.toContain(token);
    expect(JSON.stringify(testApp.logged())).not.toContain(token);
  });
});

describe('one press in the mail program', () => {
  it('stops what is queued already, and says so on the record', async () => {
    const { reader, message } = await reminded();
    await press(pathIn(message)).expect(204);
    await press(pathIn(message)).expect(204);
    expect(await remindersBy(NEXT_EVENING, reader)).toEqual([message]);
    expect(
      (await outboxOf(testApp, 'reminder')).map(({ status, last_error }) => [status, last_error]),
    ).toEqual([
      ['sent', null],
      ['cancelled', 'declined'],
    ]);
    const { rows } = await testApp.context.database.$client.query(
      `SELECT actor_id FROM audit_events WHERE action = 'reminders.stopped' AND patient_id = $1`,
      [reader.patient.id],
    );
    expect(rows).toEqual([{ actor_id: null }, { actor_id: null }]);
  });

  it('is understood in the other form too', async () => {
    const { reader, message } = await reminded();
    const body = `--b\r\nContent-Disposition: form-data; name="List-Unsubscribe"\r\n\r\nOne-Click\r\n--b--\r\n`;
    await press(pathIn(message), body, 'multipart/form-data; boundary=b').expect(204);
    expect(await remindersBy(NEXT_EVENING, reader)).toHaveLength(1);
  });

  it.each([
    ['nothing', '', FORM],
    ['something else', 'List-Unsubscribe=Maybe', FORM],
    ['JSON', '{"List-Unsubscribe":"One-Click"}', 'application/json'],
    ['a form cut short', '--b\r\nContent-Disp', 'multipart/form-data; boundary=b'],
  ])('is no press with %s', async (_, body, type) => {
    const { reader, message } = await reminded();
    await press(pathIn(message), body, type).expect(422);
    await request(testApp.app).get(pathIn(message)).expect(303);
    expect(await remindersBy(NEXT_EVENING, reader)).toHaveLength(2);
  });

  it('with a secret that is none of ours, or of long ago, stops nothing', async () => {
    const { reader, message } = await reminded();
    expect((await press(`/api/unsubscribe/${'x'.repeat(43)}`).expect(410)).body).toMatchObject({
      code: 'link-expired',
    });
    const later = (days: number) => new Date(Date.parse(EVENING) + days * 86_400_000);
    const { database } = testApp.context;
    await inTransaction(database, (tx) => forgetOldLinks(tx, later(364)));
    await press(pathIn(message)).expect(204);
    await inTransaction(database, (tx) => forgetOldLinks(tx, later(366)));
    await press(pathIn(message)).expect(410);
    expect(await (await signedIn(reader)).get('/api/my/message-preferences')).toMatchObject({
      body: { reminders: false },
    });
  });

  it('stops nothing of somebody else, and nothing but reminders', async () => {
    const { reader, message } = await reminded();
    const other = await buildReader();
    await press(pathIn(message)).expect(204);
    testApp.clock.set(START);
    await book(other, CLASS);
    expect(await remindersBy(EVENING, other)).toHaveLength(1);
    await book(reader, '2026-12-20');
    await sendDue(testApp);
    const told = (await mail.caught(reader.email)).map(({ subject }) => subject);
    expect(told).toContain('Your appointment on December 20 is booked');
    // Account mail goes to the account, whatever the patient declined.
    await inTransaction(testApp.context.database, (tx) =>
      enqueueMessage(tx, {
        kind: 'password-reset',
        dedupeKey: `reset:${reader.user.id}`,
        userId: reader.user.id,
        subject: {},
        dueAt: testApp.clock.now(),
      }),
    );
    await sendDue(testApp);
    expect(await mail.caught(reader.user.email)).toHaveLength(1);
  });
});

describe('what a patient wants to be sent', () => {
  it('is to be reminded, until they say otherwise, and again when they say so', async () => {
    const reader = await buildReader();
    const browser = await signedIn(reader);
    const path = '/api/my/message-preferences';
    expect((await browser.get(path).expect(200)).body).toEqual({ reminders: true });
    await book(reader, CLASS);
    await book(reader, NEXT_CLASS);
    await browser.put(path).send({ reminders: false }).expect(200);
    expect(await remindersBy(EVENING, reader)).toEqual([]);
    const again = await signedIn(reader);
    await again.put(path).send({ reminders: 'no' }).expect(422);
    await again.put(path).send({ reminders: true }).expect(200);
    expect(await remindersBy(NEXT_EVENING, reader)).toHaveLength(1);
  });

  it('is nobody else’s to see or say', async () => {
    const nurse = await buildUser(testApp.context.database, {
      roles: ['nurse'],
      siteIds: [site.id],
    });
    const browser = await agentFor(testApp, nurse);
    await browser.get('/api/my/message-preferences').expect(403);
    await browser.put('/api/my/message-preferences').send({ reminders: false }).expect(403);
  });

  it('never asks the desk to call somebody who declined', async () => {
    const reader = await buildReader();
    await book(reader, CLASS);
    await (
      await signedIn(reader)
    )
      .put('/api/my/message-preferences')
      .send({ reminders: false })
      .expect(200);
    await testApp.context.database.$client.query(
      `INSERT INTO suppressions (address, reason) VALUES ($1, 'recipient-refused')`,
      [reader.email],
    );
    await remindersBy(EVENING, reader);
    const [row] = await outboxOf(testApp, 'reminder');
    expect([row?.status, row?.last_error]).toEqual(['cancelled', 'declined']);
  });
});
