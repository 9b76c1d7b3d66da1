import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { agentFor, type Agent } from '../builders/agent';
import { buildPatient, buildSite, buildUser } from '../builders/people';
import { buildBookable, buildBooker, buildClassDate } from '../builders/schedule';
import { createTestApp, type TestApp } from '../builders/test-app';

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

type StaffRole =
  'front-desk' | 'nurse' | 'exercise-physiologist' | 'physician' | 'administrator' | 'director';

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

const book = (agent: Agent, body: object, key: string = randomUUID()) =>
  agent.post('/api/appointments').set('Idempotency-Key', key).send(body);

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
  }>('SELECT booked, monitored_booked AS monitored FROM class_dates WHERE id = $1', [classDateId]);
  return rows[0];
}

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
    const elsewhere = await buildSite(testApp.context.database);
    const stranger = await buildPatient(testApp.context.database, { siteId: elsewhere.id });
    const missing = await book(desk, { classDateId: date.id }).expect(422);
    expect(missing.body).toMatchObject({ errors: [{ path: 'patientId' }] });
    await book(desk, { classDateId: date.id, patientId: stranger.id }).expect(404);
    await book(desk, { classDateId: randomUUID(), patientId: (await bookable()).id }).expect(404);
    const physician = await staff('physician');
    await book(physician, { classDateId: date.id, patientId: stranger.id }).expect(403);
  });

  it('needs a key, answers it again with the first answer, and refuses it for another body', async () => {
    const patient = await bookable();
    const date = await classDate();
    const body = { classDateId: date.id, patientId: patient.id };
    await desk.post('/api/appointments').send(body).expect(422);
    const first = await book(desk, body, 'a key').expect(201);
    const again = await book(desk, body, 'a key').expect(201);
    expect(again.body).toEqual(first.body);
    const another = { ...body, classDateId: (await classDate()).id };
    const reused = await book(desk, another, 'a key').expect(409);
    expect(reused.body).toMatchObject({ code: 'idempotency-key-reused' });
    expect(await countersOf(date.id)).toMatchObject({ booked: 1 });
  });

  it('asks for a channel only in exercise and only for who needs one', async () => {
    const monitored = await bookable();
    const unmonitored = await bookable({ monitored: false });
    const exercise = await classDate();
    await book(desk, { classDateId: exercise.id, patientId: monitored.id }).expect(201);
    await book(desk, { classDateId: exercise.id, patientId: unmonitored.id }).expect(201);
    expect(await countersOf(exercise.id)).toEqual({ booked: 2, monitored: 1 });
    const talk = await classDate({ kind: 'education', localStart: '13:00', monitoredCapacity: 0 });
    await book(desk, { classDateId: talk.id, patientId: monitored.id }).expect(201);
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
      await book(desk, { classDateId: other.id, patientId: patient.id }).expect(201);
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
      await book(desk, { classDateId: date.id, patientId: rival.id }).expect(201);
    }
    if (has('class-closed')) await closeDate(date.id);
    return { classDateId: date.id, patientId: patient.id };
  }

  async function fillCourse(patientId: string) {
    const { rows } = await testApp.context.database.$client.query<{ left: number }>(
      'SELECT session_limit - booked AS left FROM enrollments WHERE patient_id = $1',
      [patientId],
    );
    for (let left = rows[0]?.left ?? 0; left > 0; left -= 1) {
      const date = await classDate({ localDate: `2026-12-1${left}` });
      await book(desk, { classDateId: date.id, patientId }).expect(201);
    }
  }
  const closeCourse = (id: string) =>
    testApp.context.database.$client.query(
      `UPDATE enrollments SET status = 'completed', closed_on = '2026-11-30' WHERE id = $1`,
      [id],
    );
  const closeDate = (id: string) =>
    testApp.context.database.$client.query(
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
      const reply = await book(desk, await against(reasons)).expect(409);
      expect(reply.body).toMatchObject({ code });
    },
  );

  it.each(order)('tells %s when it stands alone', async (code) => {
    const reply = await book(desk, await against([code])).expect(409);
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
    testApp.clock.set('2026-12-01T15:05:00Z');
    const begun = await book(agent, { classDateId: date.id }).expect(409);
    expect(begun.body).toMatchObject({ code: 'class-closed' });
    await book(desk, { classDateId: date.id, patientId: patient.id }).expect(201);
    testApp.clock.set('2026-12-01T15:15:00Z');
    const late = { classDateId: date.id, patientId: (await bookable()).id };
    expect((await book(desk, late).expect(409)).body).toMatchObject({ code: 'class-closed' });
    const far = await classDate({ localDate: '2027-03-04' });
    expect((await book(agent, { classDateId: far.id }).expect(409)).body).toMatchObject({
      code: 'class-closed',
    });
    const near = await classDate({ localDate: '2027-03-03' });
    await book(agent, { classDateId: near.id }).expect(201);
  });

  it('leaves nothing behind', async () => {
    const body = await against(['class-full']);
    await book(desk, body, 'refused key').expect(409);
    const { rows } = await testApp.context.database.$client.query(
      `SELECT 1 FROM appointments WHERE patient_id = $1
       UNION ALL SELECT 1 FROM idempotency_keys WHERE key = 'refused key'
       UNION ALL SELECT 1 FROM patient_days WHERE patient_id = $1`,
      [body.patientId],
    );
    expect(rows).toEqual([]);
  });
});

describe('changing an appointment', () => {
  const patch = (agent: Agent, id: string, body: object) =>
    agent.patch(`/api/appointments/${id}`).send(body);

  /** The way from booked to each status. */
  const ways: Record<string, readonly string[]> = {
    booked: [],
    arrived: ['arrived'],
    'checked-in': ['arrived', 'checked-in'],
    cancelled: ['cancelled'],
    noshow: ['noshow'],
  };
  const allowed: Record<string, readonly string[]> = {
    booked: ['arrived', 'cancelled', 'noshow'],
    arrived: ['booked', 'checked-in'],
    'checked-in': ['booked'],
    cancelled: [],
    noshow: ['booked'],
  };
  const targets = [
    'booked',
    'arrived',
    'checked-in',
    'fulfilled',
    'cancelled',
    'noshow',
    'waitlist',
  ];
  const cells = Object.keys(ways).flatMap((from) => targets.map((to) => [from, to] as const));

  it.each(cells)('from %s to %s', async (from, to) => {
    const nurse = await staff('nurse');
    const { appointment, date } = await booked();
    let { version } = appointment;
    for (const status of ways[from] ?? []) {
      const reply = await patch(nurse, appointment.id, { status, version }).expect(200);
      version = (reply.body as { version: number }).version;
    }
    const reply = await patch(nurse, appointment.id, { status: to, version });
    if (allowed[from]?.includes(to)) {
      expect(reply.status).toBe(200);
      expect(reply.body).toMatchObject({ status: to, version: version + 1 });
    } else {
      expect(reply.status).toBe(409);
      expect(reply.body).toMatchObject({ code: 'illegal-transition' });
    }
    const freed = from === 'cancelled' || (to === 'cancelled' && reply.status === 200);
    expect(await countersOf(date.id)).toEqual({ booked: freed ? 0 : 1, monitored: freed ? 0 : 1 });
  });

  it('lets the front desk mark who arrived, and clinical staff alone check in', async () => {
    const { appointment } = await booked();
    await patch(desk, appointment.id, { status: 'arrived', version: 1 }).expect(200);
    await patch(desk, appointment.id, { status: 'checked-in', version: 2 }).expect(403);
  });

  it('lets the administrator alone strike out what was entered in error, from any status', async () => {
    const { appointment, date } = await booked();
    const body = { status: 'entered-in-error', reason: 'Wrong patient', version: 1 };
    await patch(desk, appointment.id, body).expect(403);
    const administrator = await staff('administrator');
    await patch(administrator, appointment.id, { status: 'cancelled', version: 1 }).expect(403);
    await patch(administrator, appointment.id, body).expect(200);
    expect(await countersOf(date.id)).toEqual({ booked: 0, monitored: 0 });
  });

  it('refuses a change made on an older version, and an appointment of another site', async () => {
    const { appointment } = await booked();
    const stale = await patch(desk, appointment.id, { status: 'arrived', version: 2 }).expect(409);
    expect(stale.body).toMatchObject({ code: 'stale-version' });
    const elsewhere = await staff('front-desk', [(await buildSite(testApp.context.database)).id]);
    await patch(elsewhere, appointment.id, { status: 'arrived', version: 1 }).expect(404);
    await patch(desk, randomUUID(), { status: 'arrived', version: 1 }).expect(404);
  });

  it('takes a mark back only until the class’s day ends', async () => {
    const { appointment } = await booked();
    await patch(desk, appointment.id, { status: 'noshow', version: 1 }).expect(200);
    testApp.clock.set('2026-12-08T05:00:00Z');
    // The session idles out with the clock, so a fresh one asks.
    const later = await staff('front-desk');
    const reply = await patch(later, appointment.id, { status: 'booked', version: 2 }).expect(409);
    expect(reply.body).toMatchObject({ code: 'illegal-transition' });
  });

  it('lets a patient cancel their own until it starts, and nothing else', async () => {
    const { agent } = await booker();
    const date = await classDate({ localDate: '2026-12-01', localStart: '10:10' });
    const made = await book(agent, { classDateId: date.id }).expect(201);
    const { id } = made.body as { id: string };
    await patch(agent, id, { status: 'arrived', version: 1 }).expect(403);
    await patch(agent, id, { status: 'fulfilled', version: 1 }).expect(403);
    testApp.clock.set('2026-12-01T15:10:00Z');
    const started = await patch(agent, id, { status: 'cancelled', version: 1 }).expect(409);
    expect(started.body).toMatchObject({ code: 'illegal-transition' });
    testApp.clock.set('2026-12-01T15:09:59Z');
    await patch(agent, id, { status: 'cancelled', version: 1 }).expect(200);
    const stranger = await booker();
    await patch(stranger.agent, id, { status: 'cancelled', version: 2 }).expect(404);
    await book(agent, { classDateId: date.id }).expect(201);
  });
});

describe('messages', () => {
  const messagesTo = async (patientId: string) => {
    const { rows } = await testApp.context.database.$client.query<{
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
    await book(desk, { classDateId: date.id, patientId: patient.id }).expect(409);
    await desk
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
    const reply = await desk
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
    const window = await desk.get(path).expect(200);
    expect(window.body).toMatchObject({
      items: [{ localDate: '2026-12-08', site: { name: site.name, timeZone: 'America/New_York' } }],
    });
    await agent.get('/api/appointments?cursor=nonsense').expect(422);
    await desk.get('/api/appointments').expect(422);
    const stranger = await booker();
    await stranger.agent.get(`/api/appointments?patientId=${patient.id}`).expect(404);
  });

  it('shows the class dates of a site by local date, to anyone signed in', async () => {
    const { agent } = await booker();
    await classDate({ localDate: '2026-12-07' });
    await classDate({ localDate: '2026-12-08', localStart: '19:30' });
    await classDate({ localDate: '2026-12-09' });
    const path = `/api/class-dates?siteId=${site.id}`;
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
    const reply = await desk.get(`/api/class-dates/${date.id}/appointments`).expect(200);
    expect(reply.body).toMatchObject({
      items: [{ patientId: patient.id, recordNumber: patient.recordNumber, status: 'booked' }],
    });
    await agent.get(`/api/class-dates/${date.id}/appointments`).expect(403);
    const elsewhere = await staff('nurse', [(await buildSite(testApp.context.database)).id]);
    const none = await elsewhere.get(`/api/class-dates/${date.id}/appointments`).expect(200);
    expect(none.body).toEqual({ items: [] });
    const { rows } = await testApp.context.database.$client.query(
      `SELECT 1 FROM audit_events WHERE action = 'class-date.appointments-read' AND patient_id = $1`,
      [patient.id],
    );
    expect(rows).toHaveLength(1);
  });
});
