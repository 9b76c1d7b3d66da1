import { describe, expect, it } from 'vitest';
import { sendMessage, waitAfter } from '../../server/messages/sending-service';
import { EVENING_BEFORE, mailHouse } from '../builders/mail-house';
import { outboxOf, sendDue } from '../builders/outbox';
import { hours, minutes } from '../builders/test-clock';

const house = mailHouse();
const { change, atDesk, patientWith, book, booked, statuses } = house;

describe('a mail server that fails', () => {
  it('is asked again later, ever later', async () => {
    const { email } = await booked();
    await house.mail.faults({ kind: 'refuse-recipient', code: 450 });
    await sendDue(house.testApp);
    const [row] = await outboxOf(house.testApp, 'booking-confirmation');
    expect(row?.status).toBe('pending');
    const wait = (row?.hold_until?.getTime() ?? 0) - house.testApp.clock.now().getTime();
    expect(wait).toBeGreaterThanOrEqual(45_000);
    expect(wait).toBeLessThanOrEqual(75_000);
    await sendDue(house.testApp);
    expect(await house.mail.caught(email)).toEqual([]);
    house.testApp.clock.advance(minutes(2));
    await sendDue(house.testApp);
    expect(await house.mail.caught(email)).toHaveLength(1);
    expect([1, 2, 3, 4, 5, 9].map((tries) => waitAfter(tries, 0.5) / 60_000)).toEqual([
      1, 2, 4, 8, 15, 15,
    ]);
  });

  it('is given up after two days, and the desk sees it', async () => {
    await booked();
    house.testApp.clock.advance(hours(49));
    await house.mail.faults({ kind: 'refuse-recipient', code: 450 });
    await sendDue(house.testApp);
    expect(await statuses('booking-confirmation')).toEqual([['failed', 'not-reached']]);
  });

  it('that hangs up after the message leaves it uncertain, and the repeat can be told as one', async () => {
    await booked();
    await house.mail.faults({ kind: 'drop-after-message', keep: true });
    await sendDue(house.testApp);
    expect((await outboxOf(house.testApp, 'booking-confirmation'))[0]?.status).toBe('uncertain');
    house.testApp.clock.advance(minutes(2));
    await sendDue(house.testApp);
    expect(await statuses('booking-confirmation')).toEqual([['sent', null]]);
    const messages = await house.mail.caught();
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
      house.testApp.clock.now(),
    );
    await house.mail.faults({ kind: 'drop-after-message', keep: true }, 20);
    await house.mail.faults({ kind: 'drop-after-message', keep: false }, 20);
    for (const { id } of rows) await sendMessage(house.testApp.context, id);
    house.testApp.clock.advance(minutes(2));
    for (const { id } of rows) await sendMessage(house.testApp.context, id);
    const messages = await house.mail.caught();
    const ids = messages.map(({ messageId }) => messageId);
    expect(new Set(ids).size).toBe(40);
    expect(ids.length).toBeLessThanOrEqual(60);
  });

  it('that knows no such person is asked no second time, and the desk is told to call', async () => {
    const person = await patientWith({ phone: '555-0123' });
    await book(person);
    await house.mail.faults({ kind: 'refuse-recipient', code: 550 });
    await sendDue(house.testApp);
    house.testApp.clock.set(EVENING_BEFORE);
    await sendDue(house.testApp);
    expect(await house.mail.caught(person.email)).toEqual([]);
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
    await sendDue(house.testApp);
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
