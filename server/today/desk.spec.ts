import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DeskToday } from '@shared/contracts/desk-contract';
import { agentFor, type Agent } from '../../test/builders/agent';
import { buildPrice } from '../../test/builders/money';
import { buildSite, buildUser } from '../../test/builders/people';
import { buildBookable, buildClassDate } from '../../test/builders/schedule';
import { createTestApp, type TestApp } from '../../test/builders/test-app';

// It is 10:00 in New York on Tuesday, December 1.
let house: TestApp;
let desk: Agent;
let site: Awaited<ReturnType<typeof buildSite>>;

beforeAll(async () => {
  house = await createTestApp();
  const { database } = house.context;
  site = await buildSite(database, { name: 'A quay' });
  const user = await buildUser(database, { roles: ['front-desk'], siteIds: [site.id] });
  desk = await agentFor(house, user);
});
afterAll(() => house.close());

const read = async (agent = desk) =>
  (await agent.get('/api/desk/today').expect(200)).body as DeskToday;

async function book(classDateId: string): Promise<{ id: string; patientId: string }> {
  const { id: patientId } = await buildBookable(house.context.database, site);
  const { body } = await desk
    .post('/api/appointments')
    .set('Idempotency-Key', randomUUID())
    .send({ patientId, classDateId })
    .expect(201);
  return { id: (body as { id: string }).id, patientId };
}

const change = (id: string, status: string) =>
  desk.patch(`/api/appointments/${id}`).send({ status, version: 1 }).expect(200);

describe('the desk’s day', () => {
  it('lists today’s classes at the site with who comes, what is due and what is free', async () => {
    const { database } = house.context;
    const price = await buildPrice(database);
    const today = { localDate: '2026-12-01', capacity: 4 };
    const noon = await buildClassDate(database, site, {
      ...today,
      localStart: '12:00',
      priceItemId: price.id,
    });
    await buildClassDate(database, site, { localDate: '2026-12-02' });
    const [here, due] = [await book(noon.id), await book(noon.id)];
    await change(here.id, 'arrived');
    const { at, sites } = await read();
    expect(at).toBe('2026-12-01T15:00:00.000Z');
    expect(sites).toHaveLength(1);
    expect(sites[0]).toMatchObject({ id: site.id, localDate: '2026-12-01', freed: [] });
    const [only, ...others] = sites[0]?.classes ?? [];
    expect(others).toEqual([]);
    expect(only).toMatchObject({ id: noon.id, capacity: 4, booked: 2 });
    const byId = new Map(only?.arrivals.map((one) => [one.appointmentId, one]));
    expect(byId.get(here.id)).toMatchObject({ status: 'arrived', version: 2 });
    expect(byId.get(due.id)).toMatchObject({
      status: 'booked',
      due: { amountMinor: 2500, currency: 'USD' },
    });
  });

  it('tells of places given back since yesterday in classes to come, and how many are free there', async () => {
    const { database } = house.context;
    const soon = await buildClassDate(database, site, { localDate: '2026-12-03', capacity: 2 });
    const [first, second] = [await book(soon.id), await book(soon.id)];
    await change(first.id, 'cancelled');
    const third = await book(soon.id);
    await change(second.id, 'cancelled');
    const freed = (await read()).sites[0]?.freed ?? [];
    expect(freed.map(({ appointmentId, free }) => [appointmentId, free]).sort()).toEqual(
      [
        [first.id, 1],
        [second.id, 1],
      ].sort(),
    );
    expect(freed.map(({ patientId }) => patientId)).not.toContain(third.patientId);
    await database.$client.query(
      `UPDATE appointments SET cancelled_at = '2026-11-30T04:59:59Z' WHERE id = $1`,
      [first.id],
    );
    await database.$client.query(
      `UPDATE appointments SET cancelled_at = '2026-11-30T05:00:00Z' WHERE id = $1`,
      [second.id],
    );
    const later = (await read()).sites[0]?.freed ?? [];
    expect(later.map(({ appointmentId }) => appointmentId)).toEqual([second.id]);
  });

  it('shows a desk its own sites alone, and writes down whose names it showed', async () => {
    const { database } = house.context;
    const other = await buildSite(database, { name: 'Another', timeZone: 'Pacific/Auckland' });
    const elsewhere = await agentFor(
      house,
      await buildUser(database, { roles: ['front-desk'], siteIds: [other.id] }),
    );
    const { sites } = await read(elsewhere);
    expect(sites).toEqual([
      {
        id: other.id,
        name: 'Another',
        timeZone: 'Pacific/Auckland',
        localDate: '2026-12-02',
        classes: [],
        freed: [],
      },
    ]);
    const { rows } = await database.$client.query<{ n: number }>(
      `SELECT count(DISTINCT patient_id)::int AS n FROM audit_events WHERE action = 'desk.today-read'`,
    );
    expect(rows[0]?.n).toBe(4);
  });
});
