import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { CLASS_DATES_AHEAD_DAYS } from '@shared/scheduling/booking-window';
import { planClassDates } from '../../server/schedule/class-dates-service';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildBookable, buildBooker, buildClass } from '../builders/schedule';
import { createTestApp, type TestApp } from '../builders/test-app';

let testApp: TestApp;
let site: Awaited<ReturnType<typeof buildSite>>;
let desk: Agent;

beforeAll(async () => {
  testApp = await createTestApp();
});
afterAll(() => testApp.close());

beforeEach(async () => {
  const { database, clock } = testApp.context;
  expect(clock.now().toISOString()).toBe('2026-12-01T15:00:00.000Z');
  site = await buildSite(database);
  const user = await buildUser(database, { roles: ['front-desk'], siteIds: [site.id] });
  desk = await agentFor(testApp, user);
});

const now = new Date('2026-12-01T15:00:00Z');
const plan = () => planClassDates(testApp.context.database, now);

interface DateRow {
  readonly id: string;
  readonly localDate: string;
  readonly startsAt: Date;
  readonly capacity: number;
  readonly status: string;
}

async function datesOf(templateId: string): Promise<DateRow[]> {
  const { rows } = await testApp.context.database.$client.query<DateRow>(
    `SELECT id, local_date::text AS "localDate", starts_at AS "startsAt", capacity, status
       FROM class_dates WHERE template_id = $1 ORDER BY local_date`,
    [templateId],
  );
  return rows;
}

const query = (text: string, values: unknown[]) =>
  testApp.context.database.$client.query(text, values);

describe('the planner', () => {
  it('makes the dates ahead, each once, however often and at once it runs', async () => {
    const daily = await buildClass(testApp.context.database, site);
    const twice = await buildClass(testApp.context.database, site, {
      recurrence: 'FREQ=WEEKLY;BYDAY=TU,TH',
      localStart: '14:00',
    });
    const runs = await Promise.all([plan(), plan(), plan(), plan()]);
    const first = await datesOf(daily.id);
    expect(first).toHaveLength(CLASS_DATES_AHEAD_DAYS);
    expect(first[0]?.startsAt.toISOString()).toBe('2026-12-01T14:00:00.000Z');
    expect(runs.reduce((made, run) => made + run.made, 0)).toBe(
      first.length + (await datesOf(twice.id)).length,
    );
    expect(await plan()).toEqual({ made: 0, moved: 0 });
    expect(await datesOf(daily.id)).toEqual(first);
  });

  it('leaves closed days out, and ends where the class ends', async () => {
    await query(
      `INSERT INTO closures (id, site_id, local_date, reason) VALUES ($1, $2, '2026-12-25', 'Holiday')`,
      [randomUUID(), site.id],
    );
    const daily = await buildClass(testApp.context.database, site, { endsOn: '2026-12-26' });
    await plan();
    const dates = (await datesOf(daily.id)).map(({ localDate }) => localDate);
    expect(dates).toHaveLength(25);
    expect(dates).not.toContain('2026-12-25');
  });

  it('moves dates to come, and who is booked in them, when the rules of the zone change', async () => {
    const daily = await buildClass(testApp.context.database, site, { endsOn: '2026-12-03' });
    await plan();
    const [today, tomorrow, dayAfter] = await datesOf(daily.id);
    const patient = await buildBookable(testApp.context.database, site);
    await book(patient.id, tomorrow?.id).expect(201);
    await query(`UPDATE class_dates SET status = 'closed' WHERE id = $1`, [dayAfter?.id]);
    await query(`UPDATE sites SET time_zone = 'America/Chicago' WHERE id = $1`, [site.id]);
    expect(await plan()).toEqual({ made: 0, moved: 1 });
    const moved = await datesOf(daily.id);
    expect(moved[1]?.startsAt.toISOString()).toBe('2026-12-02T15:00:00.000Z');
    expect(moved[0]?.startsAt).toEqual(today?.startsAt);
    expect(moved[2]?.startsAt).toEqual(dayAfter?.startsAt);
    const { rows } = await query('SELECT starts_at FROM appointments WHERE patient_id = $1', [
      patient.id,
    ]);
    expect(rows).toEqual([{ starts_at: moved[1]?.startsAt }]);
  });
});

function book(patientId: string, classDateId: string | undefined) {
  return desk
    .post('/api/appointments')
    .set('Idempotency-Key', randomUUID())
    .send({ patientId, classDateId });
}

describe('classes', () => {
  const fields = {
    name: 'Monitored class',
    kind: 'exercise',
    recurrence: 'FREQ=WEEKLY;BYDAY=MO,WE,FR',
    startsOn: '2026-12-01',
    endsOn: '2026-12-31',
    localStart: '09:00',
    durationMinutes: 60,
    capacity: 8,
    monitoredPlaces: 6,
    priceItemId: null,
  };

  const add = (given: object = {}) =>
    desk.post('/api/class-templates').send({ ...fields, siteId: site.id, ...given });
  const edit = (id: string, given: object = {}) =>
    desk.put(`/api/class-templates/${id}`).send({ ...fields, version: 1, ...given });

  async function added(): Promise<string> {
    const reply = await add().expect(201);
    return (reply.body as { template: { id: string } }).template.id;
  }

  it('are added with their dates, listed and refused when they make no sense', async () => {
    const id = await added();
    const dates = await datesOf(id);
    expect(dates).toHaveLength(13);
    expect(dates[0]).toMatchObject({ localDate: '2026-12-02', capacity: 8, status: 'scheduled' });
    const listed = await desk.get(`/api/class-templates?siteId=${site.id}`).expect(200);
    expect(listed.body).toMatchObject({ items: [{ id, ...fields, version: 1 }], prices: [] });
    await add({ recurrence: 'FREQ=HOURLY' }).expect(422);
    await add({ monitoredPlaces: 9 }).expect(422);
    await add({ endsOn: '2026-11-30' }).expect(422);
    await add({ durationMinutes: 5 }).expect(422);
    await add({ siteId: randomUUID() }).expect(404);
  });

  it('change the places of dates to come, never below what is booked', async () => {
    const id = await added();
    const [first] = await datesOf(id);
    for (let patients = 0; patients < 3; patients += 1) {
      const patient = await buildBookable(testApp.context.database, site);
      await book(patient.id, first?.id).expect(201);
    }
    const reply = await edit(id, { capacity: 2, monitoredPlaces: 2 }).expect(200);
    expect(reply.body).toMatchObject({ keptPlaces: [{ localDate: '2026-12-02', booked: 3 }] });
    const capacities = (await datesOf(id)).map(({ capacity }) => capacity);
    expect(capacities).toEqual([3, ...Array<number>(12).fill(2)]);
    const stale = await edit(id).expect(409);
    expect(stale.body).toMatchObject({ code: 'stale-version' });
  });

  it('move and drop dates to come only while nobody is booked in them', async () => {
    const id = await added();
    const moved = await edit(id, { recurrence: 'FREQ=WEEKLY;BYDAY=TU,WE', localStart: '10:30' });
    expect(moved.status).toBe(200);
    const dates = await datesOf(id);
    expect(dates.map(({ localDate }) => localDate).slice(0, 3)).toEqual([
      '2026-12-01',
      '2026-12-02',
      '2026-12-08',
    ]);
    expect(dates[1]?.startsAt.toISOString()).toBe('2026-12-02T15:30:00.000Z');
    const patient = await buildBookable(testApp.context.database, site);
    await book(patient.id, dates[2]?.id).expect(201);
    const refused = await edit(id, { version: 2 }).expect(409);
    expect(refused.body).toMatchObject({
      code: 'class-has-bookings',
      errors: [{ message: 'Patients are booked on 2026-12-08' }],
    });
    expect(await datesOf(id)).toEqual(dates);
  });

  it('bring a date back that they had dropped while it was known to a patient', async () => {
    const id = await added();
    const [first] = await datesOf(id);
    const patient = await buildBookable(testApp.context.database, site);
    const made = await book(patient.id, first?.id).expect(201);
    const { id: appointmentId } = made.body as { id: string };
    await desk
      .patch(`/api/appointments/${appointmentId}`)
      .send({ status: 'cancelled', version: 1 })
      .expect(200);
    await edit(id, { recurrence: 'FREQ=WEEKLY;BYDAY=MO' }).expect(200);
    expect((await datesOf(id))[0]).toMatchObject({ id: first?.id, status: 'cancelled' });
    await edit(id, { version: 2 }).expect(200);
    expect((await datesOf(id))[0]).toMatchObject({ id: first?.id, status: 'scheduled' });
    await book(patient.id, first?.id).expect(201);
  });

  it('are planned by the front desk of the site and administrators alone', async () => {
    const id = await added();
    const { database } = testApp.context;
    const elsewhere = await buildSite(database);
    const other = await agentFor(
      testApp,
      await buildUser(database, { roles: ['front-desk'], siteIds: [elsewhere.id] }),
    );
    await other
      .put(`/api/class-templates/${id}`)
      .send({ ...fields, version: 1 })
      .expect(404);
    const nurse = await agentFor(
      testApp,
      await buildUser(database, { roles: ['nurse'], siteIds: [site.id] }),
    );
    await nurse.get(`/api/class-templates?siteId=${site.id}`).expect(403);
    const administrator = await agentFor(
      testApp,
      await buildUser(database, { roles: ['administrator'] }),
    );
    await administrator.get(`/api/class-templates?siteId=${site.id}`).expect(200);
  });

  it('close for a day: who is booked is cancelled, and nobody books until it opens again', async () => {
    const id = await added();
    const [first] = await datesOf(id);
    const { user, patient } = await buildBooker(testApp.context.database, site);
    await book(patient.id, first?.id).expect(201);
    const closure = { siteId: site.id, localDate: '2026-12-02', reason: 'Burst pipe' };
    const closed = await desk.post('/api/closures').send(closure).expect(201);
    expect(closed.body).toMatchObject({ closure, cancelled: 1 });
    const own = await agentFor(testApp, user);
    const mine = await own.get('/api/appointments').expect(200);
    expect(mine.body).toMatchObject({
      items: [{ status: 'cancelled', cancelledReason: 'Closed: Burst pipe' }],
    });
    const refused = await book(patient.id, first?.id).expect(409);
    expect(refused.body).toMatchObject({ code: 'class-closed' });
    const again = await desk.post('/api/closures').send(closure).expect(201);
    expect(again.body).toMatchObject({ cancelled: 0 });
    const listed = await desk.get(`/api/closures?siteId=${site.id}&from=2026-12-01`).expect(200);
    const { items } = listed.body as { items: { id: string }[] };
    await desk.delete(`/api/closures/${items[0]?.id}`).expect(204);
    await desk.delete(`/api/closures/${items[0]?.id}`).expect(404);
    await book(patient.id, first?.id).expect(201);
  });
});
