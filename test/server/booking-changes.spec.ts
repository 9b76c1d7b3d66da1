import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { type Agent } from '../builders/agent';
import { book, bookingHouse } from '../builders/booking-house';
import { buildSite } from '../builders/people';

const house = bookingHouse();
const { staff, classDate, booker, booked, countersOf } = house;

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
    await patch(house.desk, appointment.id, { status: 'arrived', version: 1 }).expect(200);
    await patch(house.desk, appointment.id, { status: 'checked-in', version: 2 }).expect(403);
  });

  it('lets the administrator alone strike out what was entered in error, from any status', async () => {
    const { appointment, date } = await booked();
    const body = { status: 'entered-in-error', reason: 'Wrong patient', version: 1 };
    await patch(house.desk, appointment.id, body).expect(403);
    const administrator = await staff('administrator');
    await patch(administrator, appointment.id, { status: 'cancelled', version: 1 }).expect(403);
    await patch(administrator, appointment.id, body).expect(200);
    expect(await countersOf(date.id)).toEqual({ booked: 0, monitored: 0 });
  });

  it('refuses a change made on an older version, and an appointment of another site', async () => {
    const { appointment } = await booked();
    const stale = await patch(house.desk, appointment.id, { status: 'arrived', version: 2 }).expect(
      409,
    );
    expect(stale.body).toMatchObject({ code: 'stale-version' });
    const elsewhere = await staff('front-desk', [
      (await buildSite(house.testApp.context.database)).id,
    ]);
    await patch(elsewhere, appointment.id, { status: 'arrived', version: 1 }).expect(404);
    await patch(house.desk, randomUUID(), { status: 'arrived', version: 1 }).expect(404);
  });

  it('takes a mark back only until the class’s day ends', async () => {
    const { appointment } = await booked();
    await patch(house.desk, appointment.id, { status: 'noshow', version: 1 }).expect(200);
    house.testApp.clock.set('2026-12-08T05:00:00Z');
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
    house.testApp.clock.set('2026-12-01T15:10:00Z');
    const started = await patch(agent, id, { status: 'cancelled', version: 1 }).expect(409);
    expect(started.body).toMatchObject({ code: 'illegal-transition' });
    house.testApp.clock.set('2026-12-01T15:09:59Z');
    await patch(agent, id, { status: 'cancelled', version: 1 }).expect(200);
    const stranger = await booker();
    await patch(stranger.agent, id, { status: 'cancelled', version: 2 }).expect(404);
    await book(agent, { classDateId: date.id }).expect(201);
  });
});
