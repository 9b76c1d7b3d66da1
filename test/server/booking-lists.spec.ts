import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { book, bookingHouse } from '../builders/booking-house';
import { buildSite } from '../builders/people';

const house = bookingHouse();
const { staff, classDate, bookable, booker, booked } = house;

describe('messages', () => {
  const messagesTo = async (patientId: string) => {
    const { rows } = await house.testApp.context.database.$client.query<{
      kind: string;
      subject: object;
    }>(
      `SELECT kind, subject FROM outbox WHERE patient_id = $1 AND kind LIKE 'booking-%'
        ORDER BY created_at, kind DESC`,
      [patientId],
    );
    return rows;
  };

  it('go into the outbox with the booking and with its cancellation, a refused one leaves none', async () => {
    const { patient, date, appointment } = await booked();
    await book(house.desk, { classDateId: date.id, patientId: patient.id }).expect(409);
    await house.desk
      .patch(`/api/appointments/${appointment.id}`)
      .send({ status: 'cancelled', version: 1 })
      .expect(200);
    const subject = { appointmentIds: appointment.id };
    expect(await messagesTo(patient.id)).toEqual([
      { kind: 'booking-confirmation', subject },
      { kind: 'booking-cancellation', subject },
    ]);
  });

  it('confirm a series once', async () => {
    const patient = await bookable();
    const dates = [await classDate(), await classDate({ localDate: '2026-12-08' })];
    const reply = await house.desk
      .post('/api/appointments/series')
      .set('Idempotency-Key', randomUUID())
      .send({ patientId: patient.id, classDateIds: dates.map(({ id }) => id) })
      .expect(201);
    const { items } = reply.body as { items: { id: string }[] };
    expect(await messagesTo(patient.id)).toEqual([
      {
        kind: 'booking-confirmation',
        subject: { appointmentIds: items.map(({ id }) => id).join(' ') },
      },
    ]);
  });
});

describe('lists', () => {
  it('shows a patient their own appointments by page, either way round', async () => {
    const { agent, patient } = await booker();
    for (const day of ['2026-12-07', '2026-12-08', '2026-12-09']) {
      const date = await classDate({ localDate: day });
      await book(agent, { classDateId: date.id }).expect(201);
    }
    const first = await agent.get('/api/appointments?limit=2').expect(200);
    const page = first.body as { items: { localDate: string }[]; nextCursor: string };
    expect(page.items.map(({ localDate }) => localDate)).toEqual(['2026-12-07', '2026-12-08']);
    const rest = await agent.get(`/api/appointments?limit=2&cursor=${page.nextCursor}`).expect(200);
    expect(rest.body).toMatchObject({ items: [{ localDate: '2026-12-09' }], nextCursor: null });
    const path = `/api/appointments?patientId=${patient.id}&order=latest-first&from=2026-12-08&to=2026-12-09`;
    const window = await house.desk.get(path).expect(200);
    expect(window.body).toMatchObject({
      items: [
        { localDate: '2026-12-08', site: { name: house.site.name, timeZone: 'America/New_York' } },
      ],
    });
    await agent.get('/api/appointments?cursor=nonsense').expect(422);
    await house.desk.get('/api/appointments').expect(422);
    const stranger = await booker();
    await stranger.agent.get(`/api/appointments?patientId=${patient.id}`).expect(404);
  });

  it('shows the class dates of a site by local date, to anyone signed in', async () => {
    const { agent } = await booker();
    await classDate({ localDate: '2026-12-07' });
    await classDate({ localDate: '2026-12-08', localStart: '19:30' });
    await classDate({ localDate: '2026-12-09' });
    const path = `/api/class-dates?siteId=${house.site.id}`;
    const reply = await agent.get(`${path}&from=2026-12-07&to=2026-12-09`).expect(200);
    expect(reply.body).toMatchObject({
      items: [
        { localDate: '2026-12-07', localStart: '09:00', booked: 0, capacity: 12, price: null },
        { localDate: '2026-12-08', localStart: '19:30', startsAt: '2026-12-09T00:30:00.000Z' },
      ],
      nextCursor: null,
    });
    await agent.get(`${path}&from=2026-12-01&to=2027-03-04`).expect(422);
    await agent.get(`${path}&from=2026-12-01&to=2026-12-01`).expect(422);
    await agent
      .get(`/api/class-dates?siteId=${randomUUID()}&from=2026-12-01&to=2026-12-02`)
      .expect(404);
  });

  it('shows staff who is in a class: those of their sites, with a trace of each', async () => {
    const { date, patient } = await booked();
    const { agent } = await booker();
    const reply = await house.desk.get(`/api/class-dates/${date.id}/appointments`).expect(200);
    expect(reply.body).toMatchObject({
      items: [{ patientId: patient.id, recordNumber: patient.recordNumber, status: 'booked' }],
    });
    await agent.get(`/api/class-dates/${date.id}/appointments`).expect(403);
    const elsewhere = await staff('nurse', [(await buildSite(house.testApp.context.database)).id]);
    const none = await elsewhere.get(`/api/class-dates/${date.id}/appointments`).expect(200);
    expect(none.body).toEqual({ items: [] });
    const { rows } = await house.testApp.context.database.$client.query(
      `SELECT 1 FROM audit_events WHERE action = 'class-date.appointments-read' AND patient_id = $1`,
      [patient.id],
    );
    expect(rows).toHaveLength(1);
  });
});
