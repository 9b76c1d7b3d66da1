import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { book, bookingHouse } from '../builders/booking-house';
import { buildPatient, buildSite } from '../builders/people';

const house = bookingHouse();
const { staff, classDate, bookable, booker, booked, countersOf } = house;

describe('booking', () => {
  it('takes a place for a patient of the site', async () => {
    const { patient, date, appointment } = await booked();
    expect(appointment).toMatchObject({
      classDateId: date.id,
      patientId: patient.id,
      status: 'booked',
      startsAt: '2026-12-07T14:00:00.000Z',
      endsAt: '2026-12-07T15:00:00.000Z',
      version: 1,
    });
    expect(await countersOf(date.id)).toEqual({ booked: 1, monitored: 1 });
  });

  it('lets a patient book for themselves, and for nobody else', async () => {
    const { agent, patient } = await booker();
    const other = await bookable();
    const date = await classDate();
    const reply = await book(agent, { classDateId: date.id }).expect(201);
    expect(reply.body).toMatchObject({ patientId: patient.id });
    const refused = await book(agent, { classDateId: date.id, patientId: other.id }).expect(404);
    expect(refused.body).toMatchObject({ code: 'not-found' });
  });

  it('asks staff for the patient, and opens only those of their sites', async () => {
    const date = await classDate();
    const elsewhere = await buildSite(house.testApp.context.database);
    const stranger = await buildPatient(house.testApp.context.database, { siteId: elsewhere.id });
    const missing = await book(house.desk, { classDateId: date.id }).expect(422);
    expect(missing.body).toMatchObject({ errors: [{ path: 'patientId' }] });
    await book(house.desk, { classDateId: date.id, patientId: stranger.id }).expect(404);
    await book(house.desk, { classDateId: randomUUID(), patientId: (await bookable()).id }).expect(
      404,
    );
    const physician = await staff('physician');
    await book(physician, { classDateId: date.id, patientId: stranger.id }).expect(403);
  });

  it('needs a key, answers it again with the first answer, and refuses it for another body', async () => {
    const patient = await bookable();
    const date = await classDate();
    const body = { classDateId: date.id, patientId: patient.id };
    await house.desk.post('/api/appointments').send(body).expect(422);
    const first = await book(house.desk, body, 'a key').expect(201);
    const again = await book(house.desk, body, 'a key').expect(201);
    expect(again.body).toEqual(first.body);
    const another = { ...body, classDateId: (await classDate()).id };
    const reused = await book(house.desk, another, 'a key').expect(409);
    expect(reused.body).toMatchObject({ code: 'idempotency-key-reused' });
    expect(await countersOf(date.id)).toMatchObject({ booked: 1 });
  });

  it('asks for a channel only in exercise and only for who needs one', async () => {
    const monitored = await bookable();
    const unmonitored = await bookable({ monitored: false });
    const exercise = await classDate();
    await book(house.desk, { classDateId: exercise.id, patientId: monitored.id }).expect(201);
    await book(house.desk, { classDateId: exercise.id, patientId: unmonitored.id }).expect(201);
    expect(await countersOf(exercise.id)).toEqual({ booked: 2, monitored: 1 });
    const talk = await classDate({ kind: 'education', localStart: '13:00', monitoredCapacity: 0 });
    await book(house.desk, { classDateId: talk.id, patientId: monitored.id }).expect(201);
    expect(await countersOf(talk.id)).toEqual({ booked: 1, monitored: 0 });
  });
});

describe('the reasons against a booking', () => {
  /** A patient and a class to which the named reasons all apply. */
  async function against(reasons: readonly string[]) {
    const has = (reason: string) => reasons.includes(reason);
    const patient = await bookable({ sessionLimit: 2, dailyLimit: has('daily-limit') ? 1 : 2 });
    const sameDay = has('overlapping-appointment') ? '09:30' : '14:00';
    if (has('daily-limit') || has('overlapping-appointment')) {
      const other = await classDate({ localStart: sameDay });
      await book(house.desk, { classDateId: other.id, patientId: patient.id }).expect(201);
    }
    if (has('course-complete')) await fillCourse(patient.id);
    if (has('no-active-enrollment')) await closeCourse(patient.enrollmentId);
    const capacity = has('class-full') ? 1 : 2;
    const date = await classDate({
      capacity,
      monitoredCapacity: has('monitors-full') ? 1 : capacity,
    });
    if (has('class-full') || has('monitors-full')) {
      const rival = await bookable();
      await book(house.desk, { classDateId: date.id, patientId: rival.id }).expect(201);
    }
    if (has('class-closed')) await closeDate(date.id);
    return { classDateId: date.id, patientId: patient.id };
  }

  async function fillCourse(patientId: string) {
    const { rows } = await house.testApp.context.database.$client.query<{ left: number }>(
      'SELECT session_limit - booked AS left FROM enrollments WHERE patient_id = $1',
      [patientId],
    );
    for (let left = rows[0]?.left ?? 0; left > 0; left -= 1) {
      const date = await classDate({ localDate: `2026-12-1${left}` });
      await book(house.desk, { classDateId: date.id, patientId }).expect(201);
    }
  }
  const closeCourse = (id: string) =>
    house.testApp.context.database.$client.query(
      `UPDATE enrollments SET status = 'completed', closed_on = '2026-11-30' WHERE id = $1`,
      [id],
    );
  const closeDate = (id: string) =>
    house.testApp.context.database.$client.query(
      `UPDATE class_dates SET status = 'closed' WHERE id = $1`,
      [id],
    );

  const order = [
    'class-closed',
    'no-active-enrollment',
    'course-complete',
    'daily-limit',
    'overlapping-appointment',
    'class-full',
    'monitors-full',
  ];

  it.each(order.map((code, index) => [code, order.slice(index)] as const))(
    'tells %s before all that come after it',
    async (code, reasons) => {
      const reply = await book(house.desk, await against(reasons)).expect(409);
      expect(reply.body).toMatchObject({ code });
    },
  );

  it.each(order)('tells %s when it stands alone', async (code) => {
    const reply = await book(house.desk, await against([code])).expect(409);
    expect(reply.body).toMatchObject({ code });
  });

  it('counts a class that is over as closed; to a patient one that has begun, or is too far ahead', async () => {
    const { agent } = await booker();
    const patient = await bookable();
    const date = await classDate({
      localDate: '2026-12-01',
      localStart: '10:05',
      durationMinutes: 10,
    });
    house.testApp.clock.set('2026-12-01T15:05:00Z');
    const begun = await book(agent, { classDateId: date.id }).expect(409);
    expect(begun.body).toMatchObject({ code: 'class-closed' });
    await book(house.desk, { classDateId: date.id, patientId: patient.id }).expect(201);
    house.testApp.clock.set('2026-12-01T15:15:00Z');
    const late = { classDateId: date.id, patientId: (await bookable()).id };
    expect((await book(house.desk, late).expect(409)).body).toMatchObject({ code: 'class-closed' });
    const far = await classDate({ localDate: '2027-03-04' });
    expect((await book(agent, { classDateId: far.id }).expect(409)).body).toMatchObject({
      code: 'class-closed',
    });
    const near = await classDate({ localDate: '2027-03-03' });
    await book(agent, { classDateId: near.id }).expect(201);
  });

  it('leaves nothing behind', async () => {
    const body = await against(['class-full']);
    await book(house.desk, body, 'refused key').expect(409);
    const { rows } = await house.testApp.context.database.$client.query(
      `SELECT 1 FROM appointments WHERE patient_id = $1
       UNION ALL SELECT 1 FROM idempotency_keys WHERE key = 'refused key'
       UNION ALL SELECT 1 FROM patient_days WHERE patient_id = $1`,
      [body.patientId],
    );
    expect(rows).toEqual([]);
  });
});
