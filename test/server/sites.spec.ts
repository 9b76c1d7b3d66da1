import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { ChangedSite } from '@shared/contracts/sites-contract';
import { planClassDates } from '../../server/schedule/class-dates-service';
import { agentFor, type Agent } from '../builders/agent';
import { buildSite, buildUser } from '../builders/people';
import { buildBookable, buildClass } from '../builders/schedule';
import { createTestApp, type TestApp } from '../builders/test-app';

let house: TestApp;
let administrator: Agent;
let desk: Agent;
let site: Awaited<ReturnType<typeof buildSite>>;
let other: typeof site;

beforeAll(async () => {
  house = await createTestApp();
  const { database } = house.context;
  administrator = await agentFor(house, await buildUser(database, { roles: ['administrator'] }));
});
afterAll(() => house.close());

beforeEach(async () => {
  const { database } = house.context;
  [site, other] = [await buildSite(database), await buildSite(database)];
  const siteIds = [site.id, other.id];
  desk = await agentFor(house, await buildUser(database, { roles: ['front-desk'], siteIds }));
});

const query = async <T extends object>(text: string, ...values: unknown[]) =>
  (await house.context.database.$client.query<T>(text, values)).rows;

const change = (given: object = {}, id = site.id) => {
  const { name, timeZone, address, phone } = site;
  const body = { name, timeZone, address, phone, version: 1, ...given };
  return administrator.put(`/api/sites/${id}`).send(body);
};

/** A class at a wall time with its dates ahead. @returns the date of the second day */
async function classAt(localStart: string, at = site) {
  const { database, clock } = house.context;
  const { id } = await buildClass(database, at, { localStart, endsOn: '2026-12-05' });
  await planClassDates(database, clock.now());
  const [row] = await query<{ id: string }>(
    `SELECT id FROM class_dates WHERE template_id = $1 AND local_date = '2026-12-03'`,
    id,
  );
  return { templateId: id, dateId: row?.id ?? '' };
}

async function book(patientId: string, classDateId: string): Promise<void> {
  await desk
    .post('/api/appointments')
    .set('Idempotency-Key', randomUUID())
    .send({ patientId, classDateId })
    .expect(201);
}

const startsOf = async (patientId: string) =>
  (
    await query<{ starts: Date }>(
      'SELECT starts_at AS starts FROM appointments WHERE patient_id = $1 ORDER BY 1',
      patientId,
    )
  ).map(({ starts }) => starts.toISOString());

describe('a site', () => {
  it('is changed once by who has read it last, and the audit names the fields', async () => {
    const name = `Harbor ${randomUUID().slice(0, 6)}`;
    const { body } = await change({ name, phone: '555-0199' }).expect(200);
    expect(body).toEqual({
      site: {
        id: site.id,
        name,
        timeZone: site.timeZone,
        address: site.address,
        phone: '555-0199',
        version: 2,
      },
      movedClassDates: 0,
    });
    const stale = await change({ address: '2 Wharf Road' }).expect(409);
    expect(stale.body.code).toBe('stale-version');
    const events = await query<{ details: object }>(
      `SELECT details FROM audit_events WHERE action = 'site.changed' AND object_id = $1`,
      site.id,
    );
    expect(events).toEqual([{ details: { fields: ['name', 'phone'], movedClassDates: 0 } }]);
  });

  it('of two changes at once takes one', async () => {
    const replies = await Promise.all([
      change({ phone: '555-0150' }),
      change({ phone: '555-0151' }),
      change({ phone: '555-0152' }),
    ]);
    expect(replies.map(({ status }) => status).sort()).toEqual([200, 409, 409]);
  });

  it('keeps a name of its own, a zone that there is, and its roles', async () => {
    expect((await change({ name: other.name }).expect(409)).body.code).toBe('already-recorded');
    const wrong = await change({ timeZone: 'America/Harbor' }).expect(422);
    expect(wrong.body.errors[0].path).toBe('timeZone');
    await change({}, randomUUID()).expect(404);
    await desk.put(`/api/sites/${site.id}`).send({}).expect(403);
  });
});

describe('another time zone', () => {
  it('moves classes to come, their places and reminders to the same time on its wall', async () => {
    const [nine, ten] = [await classAt('09:00'), await classAt('10:00')];
    const patient = await buildBookable(house.context.database, site);
    await book(patient.id, nine.dateId);
    await book(patient.id, ten.dateId);
    const dueAt = () =>
      query<{ due: Date; run: Date }>(
        `SELECT o.due_at AS due, j.run_at AS run FROM outbox o JOIN graphile_worker.jobs j ON j.key = o.dedupe_key
          WHERE o.kind = 'reminder' AND o.patient_id = $1`,
        patient.id,
      );
    expect((await dueAt())[0]?.due.toISOString()).toBe('2026-12-02T23:00:00.000Z');

    const { body } = await change({ timeZone: 'America/Chicago' }).expect(200);

    // The second to the fifth of December: today's have begun.
    expect((body as ChangedSite).movedClassDates).toBe(2 * 4);
    expect(await startsOf(patient.id)).toEqual([
      '2026-12-03T15:00:00.000Z',
      '2026-12-03T16:00:00.000Z',
    ]);
    for (const { due, run } of await dueAt()) {
      expect(due.toISOString()).toBe('2026-12-03T00:00:00.000Z');
      expect(run).toEqual(due);
    }
    const today = await query<{ starts: Date }>(
      `SELECT starts_at AS starts FROM class_dates WHERE template_id = $1 AND local_date = '2026-12-01'`,
      nine.templateId,
    );
    expect(today.map(({ starts }) => starts.toISOString())).toEqual(['2026-12-01T14:00:00.000Z']);
    const daily = await query<{ booked: number }>(
      'SELECT booked FROM class_dates WHERE id = ANY ($1)',
      [nine.dateId, ten.dateId],
    );
    expect(daily).toEqual([{ booked: 1 }, { booked: 1 }]);
  });

  it('is refused whole when somebody would be in two classes at once', async () => {
    const here = await classAt('09:00');
    const there = await classAt('10:00', other);
    const patient = await buildBookable(house.context.database, site);
    await book(patient.id, here.dateId);
    await book(patient.id, there.dateId);
    const before = await startsOf(patient.id);
    const { body } = await change({ timeZone: 'America/Chicago' }).expect(409);
    expect(body.code).toBe('overlapping-appointment');
    expect(await startsOf(patient.id)).toEqual(before);
    const [kept] = await query<{ version: number }>(
      'SELECT version FROM sites WHERE id = $1',
      site.id,
    );
    expect(kept?.version).toBe(1);
  });
});
