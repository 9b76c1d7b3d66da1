import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { PlannedDate } from '@shared/contracts/schedule-contract';
import { addDays } from '@shared/scheduling/wall-time';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildBookable, buildClassDate } from '../builders/schedule';
import { createTestApp, type TestApp } from '../builders/test-app';

let testApp: TestApp;
let site: Awaited<ReturnType<typeof buildSite>>;
let desk: Agent;

beforeAll(async () => {
  testApp = await createTestApp();
});
afterAll(() => testApp.close());

beforeEach(async () => {
  const { database } = testApp.context;
  site = await buildSite(database, { timeZone: 'America/Denver' });
  const user = await buildUser(database, { roles: ['front-desk'], siteIds: [site.id] });
  desk = await agentFor(testApp, user);
});

const classDate = (given: Parameters<typeof buildClassDate>[2] = {}) =>
  buildClassDate(testApp.context.database, site, given);
const bookable = (given: Parameters<typeof buildBookable>[2] = {}) =>
  buildBookable(testApp.context.database, site, given);

/** Classes at 9:00 on each day from Monday 2026-12-07 on. */
async function week(days = 7, given: Parameters<typeof buildClassDate>[2] = {}) {
  const dates = [];
  for (let day = 0; day < days; day += 1) {
    dates.push(await classDate({ localDate: addDays('2026-12-07', day), ...given }));
  }
  return dates;
}

const preview = (patientId: string, given: object = {}) =>
  desk.post('/api/appointments/series/preview').send({
    patientId,
    siteId: site.id,
    weekdays: [1, 3, 5],
    startTime: '09:00',
    from: '2026-12-07',
    count: 3,
    ...given,
  });

const bookSeries = (
  patientId: string,
  classDateIds: readonly string[],
  key: string = randomUUID(),
) =>
  desk
    .post('/api/appointments/series')
    .set('Idempotency-Key', key)
    .send({ patientId, classDateIds });

const bookOne = (patientId: string, classDateId: string) =>
  desk
    .post('/api/appointments')
    .set('Idempotency-Key', randomUUID())
    .send({ patientId, classDateId })
    .expect(201);

async function heldBy(patientId: string): Promise<number> {
  const { rows } = await testApp.context.database.$client.query<{ held: number }>(
    `SELECT count(*)::int AS held FROM appointments WHERE patient_id = $1 AND status = 'booked'`,
    [patientId],
  );
  return rows[0]?.held ?? 0;
}

describe('the preview of a series', () => {
  it('finds three days a week at the wished hour and books nothing', async () => {
    const dates = await week();
    const patient = await bookable();
    const reply = await preview(patient.id).expect(200);
    expect(reply.body).toEqual({
      items: [0, 2, 4].map((day) => ({
        classDateId: dates[day]?.id,
        localDate: dates[day]?.localDate,
        startsAt: dates[day]?.startsAt.toISOString(),
        conflict: null,
        alternatives: [],
      })),
    });
    expect(await heldBy(patient.id)).toBe(0);
  });

  it('names what stands against a date, and what is free nearby', async () => {
    const [, , wednesday] = await week(3, { capacity: 1 });
    const afternoon = await classDate({ localDate: '2026-12-09', localStart: '14:00' });
    await bookOne((await bookable()).id, wednesday?.id ?? '');
    const patient = await bookable();
    const reply = await preview(patient.id).expect(200);
    const { items } = reply.body as { items: PlannedDate[] };
    expect(items.map(({ conflict }) => conflict)).toEqual([null, 'class-full', 'class-closed']);
    expect(items[1]?.alternatives[0]).toEqual({
      classDateId: afternoon.id,
      startsAt: '2026-12-09T21:00:00.000Z',
    });
    expect(items[2]).toMatchObject({
      classDateId: null,
      localDate: '2026-12-11',
      startsAt: '2026-12-11T16:00:00.000Z',
    });
  });

  it('checks what is asked', async () => {
    const patient = await bookable();
    await preview(patient.id, { weekdays: [] }).expect(422);
    await preview(patient.id, { weekdays: [1, 1] }).expect(422);
    await preview(patient.id, { weekdays: [8] }).expect(422);
    await preview(patient.id, { startTime: '9:00' }).expect(422);
    await preview(patient.id, { count: 73 }).expect(422);
    await preview(patient.id, { siteId: randomUUID() }).expect(404);
    await preview(randomUUID()).expect(404);
  });
});

describe('booking a series', () => {
  it('books every date, once for one key', async () => {
    const dates = await week(5);
    const patient = await bookable();
    const ids = dates.map(({ id }) => id).reverse();
    const first = await bookSeries(patient.id, ids, 'a series').expect(201);
    const again = await bookSeries(patient.id, ids, 'a series').expect(201);
    expect(again.body).toEqual(first.body);
    const { items } = first.body as { items: { classDateId: string; status: string }[] };
    expect(items.map(({ classDateId }) => classDateId)).toEqual(dates.map(({ id }) => id));
    expect(await heldBy(patient.id)).toBe(5);
  });

  it('books none when one fails, and names each that failed', async () => {
    const dates = await week(4, { capacity: 1 });
    const [monday, , wednesday] = dates;
    const rival = await bookable();
    await bookOne(rival.id, monday?.id ?? '');
    await testApp.context.database.$client.query(
      `UPDATE class_dates SET status = 'closed' WHERE id = $1`,
      [wednesday?.id],
    );
    const patient = await bookable();
    const ids = [...dates.map(({ id }) => id), randomUUID()];
    const reply = await bookSeries(patient.id, ids).expect(409);
    expect(reply.body).toMatchObject({
      code: 'class-closed',
      errors: [
        { path: 'classDateIds.0', code: 'class-full' },
        { path: 'classDateIds.2', code: 'class-closed' },
        { path: 'classDateIds.4', code: 'class-closed' },
      ],
    });
    expect(await heldBy(patient.id)).toBe(0);
  });

  it('counts its own dates against the course, the day and the hour', async () => {
    const dates = await week(3);
    const short = await bookable({ sessionLimit: 2 });
    const tooMany = await bookSeries(
      short.id,
      dates.map(({ id }) => id),
    ).expect(409);
    expect(tooMany.body).toMatchObject({
      code: 'course-complete',
      errors: [{ path: 'classDateIds.2', code: 'course-complete' }],
    });
    const [nine, halfPast, ten] = [
      dates[0],
      await classDate({ localStart: '09:30' }),
      await classDate({ localStart: '10:00' }),
    ].map((date) => date?.id ?? '');
    const once = await bookable({ dailyLimit: 1 });
    const twice = await bookSeries(once.id, [nine ?? '', ten ?? '']).expect(409);
    expect(twice.body).toMatchObject({ code: 'daily-limit' });
    const patient = await bookable();
    const clash = await bookSeries(patient.id, [nine ?? '', halfPast ?? '']).expect(409);
    expect(clash.body).toMatchObject({ code: 'overlapping-appointment' });
    await bookSeries(patient.id, [nine ?? '', ten ?? '']).expect(201);
  });

  it('refuses a patient without a course, and one whose record is not open', async () => {
    const [date] = await week(1);
    const patient = await bookable({ status: 'on-hold' });
    const reply = await bookSeries(patient.id, [date?.id ?? '']).expect(409);
    expect(reply.body).toMatchObject({ code: 'no-active-enrollment' });
    const elsewhere = await buildSite(testApp.context.database);
    const stranger = await buildBookable(testApp.context.database, elsewhere);
    await bookSeries(stranger.id, [date?.id ?? '']).expect(404);
  });
});
