import { describe, expect, it } from 'vitest';
import { inTransaction } from '../../server/database/transaction';
import { enqueueMessage } from '../../server/messages/messages-service';
import { agentFor } from '../builders/agent';
import { anAddress, EVENING_BEFORE, mailHouse } from '../builders/mail-house';
import { outboxOf, sendDue } from '../builders/outbox';
import { buildUser } from '../builders/people';
import { hours } from '../builders/test-clock';

const house = mailHouse();
const { change, atDesk, patientWith, book, booked, statuses } = house;

describe('what a booking tells', () => {
  it('writes confirmation and reminder with the booking, each with its job', async () => {
    await book(await patientWith());
    const rows = await outboxOf(house.testApp);
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
    const undone = inTransaction(house.testApp.context.database, async (tx) => {
      const about = { kind: 'reminder', dedupeKey: 'undone', patientId: patient.id } as const;
      await enqueueMessage(tx, { ...about, subject: {}, dueAt: house.testApp.clock.now() });
      throw new Error('the booking failed');
    });
    await expect(undone).rejects.toThrow('the booking failed');
    expect(await outboxOf(house.testApp)).toEqual([]);
    const jobs = await change(`SELECT FROM graphile_worker.jobs WHERE key = 'undone'`);
    expect(jobs.rowCount).toBe(0);
  });

  it('writes one message for one key', async () => {
    const { patient } = await patientWith();
    const about = { kind: 'reminder', dedupeKey: 'once', patientId: patient.id } as const;
    const message = { ...about, subject: {}, dueAt: house.testApp.clock.now() };
    await Promise.all(
      Array.from({ length: 8 }, () =>
        inTransaction(house.testApp.context.database, (tx) => enqueueMessage(tx, message)),
      ),
    );
    expect(await outboxOf(house.testApp)).toHaveLength(1);
  });

  it('reminds in the evening of the patient’s own zone', async () => {
    await book(await patientWith({ time_zone: 'America/Los_Angeles' }));
    const [row] = await outboxOf(house.testApp, 'reminder');
    expect(row?.due_at.toISOString()).toBe('2026-12-07T02:00:00.000Z');
  });

  it('reminds of nothing that was booked after that evening', async () => {
    house.testApp.clock.set('2026-12-06T23:00:00Z');
    await book(await patientWith());
    expect(await outboxOf(house.testApp, 'reminder')).toEqual([]);
  });

  it('tells time, place and the last moment to cancel, and says it once', async () => {
    const { email } = await booked();
    await sendDue(house.testApp);
    await sendDue(house.testApp);
    const [message, ...more] = await house.mail.caught(email);
    expect(more).toEqual([]);
    expect(message?.subject).toBe('Your appointment on December 7 is booked');
    expect(message?.text).toContain('Monday, December 7, 2026, 9:00 AM to 10:00 AM Eastern');
    expect(message?.text).toContain('1 Wharf Road');
    expect(message?.text).toContain('before Sunday, December 6, 2026 at 9:00 AM');
    expect(message?.text).toContain('http://127.0.0.1:3000/my/sessions');
    expect(await statuses('booking-confirmation')).toEqual([['sent', null]]);
  });
});

describe('what is true when it is sent', () => {
  it('says nothing of a place that was given back, and tells that it was', async () => {
    const { appointment, email } = await booked();
    await (
      await atDesk()
    )
      .patch(`/api/appointments/${appointment.id}`)
      .send({ status: 'cancelled', version: appointment.version })
      .expect(200);
    house.testApp.clock.set(EVENING_BEFORE);
    await sendDue(house.testApp);
    expect((await house.mail.caught(email)).map(({ subject }) => subject)).toEqual([
      'Your appointment on December 7 is cancelled',
    ]);
    expect(await statuses('reminder')).toEqual([['cancelled', 'withdrawn']]);
    expect(await statuses('booking-confirmation')).toEqual([['cancelled', 'overtaken']]);
  });

  it('reads the place again, whoever took it back', async () => {
    const { appointment, email } = await booked();
    await change(`UPDATE appointments SET status = 'cancelled' WHERE id = $1`, appointment.id);
    house.testApp.clock.set(EVENING_BEFORE);
    await sendDue(house.testApp);
    expect(await house.mail.caught(email)).toEqual([]);
  });

  it('waits for the evening before the day to which a class was moved', async () => {
    const { appointment, email } = await booked();
    await change(
      `UPDATE appointments SET starts_at = starts_at + interval '2 days', ends_at = ends_at + interval '2 days' WHERE id = $1`,
      appointment.id,
    );
    await change(`UPDATE outbox SET status = 'sent' WHERE kind <> 'reminder'`);
    house.testApp.clock.set(EVENING_BEFORE);
    await sendDue(house.testApp);
    expect(await house.mail.caught(email)).toEqual([]);
    house.testApp.clock.advance(hours(48));
    await sendDue(house.testApp);
    expect((await house.mail.caught(email)).map(({ subject }) => subject)).toEqual([
      'Your appointment on December 9',
    ]);
  });

  it('reminds of nothing that has begun', async () => {
    const { email } = await booked();
    house.testApp.clock.set('2026-12-07T14:00:00Z');
    await sendDue(house.testApp);
    expect(await house.mail.caught(email)).toEqual([]);
    expect(await statuses('reminder')).toEqual([['cancelled', 'overtaken']]);
  });
});

/** What would tell a stranger who sees an inbox what kind of care it is; words of the product's own field. */
const telling =
  /cardi|heart|rehab|exercis|therap|patient|clinic|medic|physio|nurse|diagnos|blood|pulse|\bbpm\b|session record|\bHL-/i;

describe('what a stranger may read', () => {
  it('tells no kind of care, in no part of any message', async () => {
    const { appointment, patient, email } = await booked();
    await sendDue(house.testApp);
    house.testApp.clock.set(EVENING_BEFORE);
    await sendDue(house.testApp);
    await (
      await atDesk()
    )
      .patch(`/api/appointments/${appointment.id}`)
      .send({ status: 'cancelled', version: appointment.version })
      .expect(200);
    await sendDue(house.testApp);
    const messages = await house.mail.caught(email);
    expect(messages).toHaveLength(3);
    for (const { id, subject, text, html, headers } of messages) {
      const readable = [
        subject,
        text,
        html ?? '',
        JSON.stringify(headers),
        await house.mail.raw(id),
      ];
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
    await sendDue(house.testApp);
    const messages = await house.mail.caught();
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
    const administrator = await buildUser(house.testApp.context.database, {
      roles: ['administrator'],
    });
    const admin = await agentFor(house.testApp, administrator);
    const email = anAddress();
    await admin
      .post('/api/users')
      .send({ email, displayName: 'Rosa Ferry', roles: ['nurse'], siteIds: [house.site.id] })
      .expect(201);
    const before = await change(`SELECT FROM user_tokens WHERE purpose = 'invitation'`);
    expect(before.rowCount).toBe(0);
    await sendDue(house.testApp);
    const [message] = await house.mail.caught(email);
    const token = /#token=([\w-]{43})/.exec(message?.text ?? '')?.[1] ?? '';
    expect(token).not.toBe('');
    const kept = await change('SELECT token_hash FROM user_tokens');
    expect(JSON.stringify(kept.rows)).not.toContain(token);
    const password = 'a long rope with three knots';
    await (await atDesk()).post('/api/auth/password').send({ token, password }).expect(204);
    await (await atDesk()).post('/api/auth/password').send({ token, password }).expect(410);
  });
});
