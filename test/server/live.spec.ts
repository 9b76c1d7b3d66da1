import { request as httpRequest, type IncomingMessage } from 'node:http';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { agentFor, type Agent } from '../builders/agent';
import { buildCourse, buildOwnCourse, buildPrescribers, buildStaff } from '../builders/prescribing';
import { buildSite } from '../builders/people';
import { startServerProcess, type ServerProcess } from '../builders/server-process';
import { createTestApp, type TestApp } from '../builders/test-app';

let house: TestApp;
let one: ServerProcess;
let other: ServerProcess;

beforeAll(async () => {
  house = await createTestApp();
  // Server processes go by the real clock, and sessions with them.
  house.clock.set(new Date().toISOString());
  [one, other] = await Promise.all([startServerProcess(house), startServerProcess(house)]);
}, 60_000);
afterAll(async () => {
  await Promise.all([one.stop(), other.stop()]);
  await house.close();
});

interface Told {
  readonly event: string;
  readonly data: string;
  readonly at: number;
}

/** Listens as a page does. */
async function listen(server: ServerProcess, agent: Agent) {
  const told: Told[] = [];
  const cookie = Object.entries(agent.cookies)
    .map(([name, value]) => `${name}=${encodeURIComponent(value)}`)
    .join('; ');
  const reply = await new Promise<IncomingMessage>((resolve, reject) => {
    const call = httpRequest(
      `${server.origin}/api/events`,
      { headers: { cookie, accept: 'text/event-stream' } },
      resolve,
    );
    call.once('error', reject);
    call.end();
  });
  let ended = false;
  let text = '';
  reply.setEncoding('utf8');
  reply.on('data', (part: string) => {
    text += part;
    const blocks = text.split('\n\n');
    text = blocks.pop() ?? '';
    for (const block of blocks) {
      const event = /^event: (.*)$/m.exec(block)?.[1];
      const data = /^data: (.*)$/m.exec(block)?.[1] ?? '';
      if (event !== undefined) told.push({ event, data, at: Date.now() });
    }
  });
  reply.on('close', () => (ended = true));
  reply.on('error', () => (ended = true));
  const changes = () => told.filter(({ event }) => event === 'change');
  await expect.poll(() => told.map(({ event }) => event), { timeout: 5000 }).toContain('ready');
  return {
    status: reply.statusCode,
    told,
    changes,
    ended: () => ended,
    close: () => reply.destroy(),
  };
}

const drug = {
  name: 'metoprolol tartrate',
  dose: '50 mg',
  schedule: 'twice a day',
  rateActing: 'beta-blocker',
  startedOn: '2026-11-30',
};

/** Saved through the second process. */
async function saveDrug(agent: Agent, patientId: string): Promise<number> {
  const cookie = Object.entries(agent.cookies)
    .map(([name, value]) => `${name}=${encodeURIComponent(value)}`)
    .join('; ');
  const reply = await fetch(`${other.origin}/api/patients/${patientId}/record/medications`, {
    method: 'POST',
    headers: {
      cookie,
      'content-type': 'application/json',
      'x-xsrf-token': agent.cookies['XSRF-TOKEN'] ?? '',
    },
    body: JSON.stringify(drug),
  });
  expect(reply.status).toBe(201);
  return Date.now();
}

describe('GET /api/events', () => {
  it('tells the open pages of one process within a second what another has saved, and nobody else', async () => {
    const people = await buildPrescribers(house);
    const own = await buildOwnCourse(house, people.site);
    const elsewhere = await buildStaff(
      house,
      (await buildSite(house.context.database)).id,
      'nurse',
    );
    const another = await buildOwnCourse(house, people.site);
    const [staff, patient, stranger, neighbor] = await Promise.all([
      listen(one, people.physiologist.agent),
      listen(one, own.agent),
      listen(one, elsewhere.agent),
      listen(one, another.agent),
    ]);
    const savedAt = await saveDrug(people.nurse.agent, own.patientId);
    await expect.poll(() => staff.changes().length, { timeout: 1000 }).toBeGreaterThan(0);
    await expect.poll(() => patient.changes().length, { timeout: 1000 }).toBeGreaterThan(0);
    expect((staff.changes()[0]?.at ?? Infinity) - savedAt).toBeLessThan(1000);
    expect(JSON.parse(staff.changes()[0]?.data ?? '')).toEqual({
      topic: 'range',
      patientId: own.patientId,
    });
    await new Promise((resolve) => setTimeout(resolve, 300));
    expect(stranger.changes()).toEqual([]);
    expect(neighbor.changes()).toEqual([]);
    [staff, patient, stranger, neighbor].forEach(({ close }) => close());
  });

  it('ends with the session that it was opened with', async () => {
    const people = await buildPrescribers(house);
    const { patientId } = await buildCourse(house, people.site);
    const stream = await listen(one, people.physiologist.agent);
    await house.context.database.$client.query('DELETE FROM sessions WHERE user_id = $1', [
      people.physiologist.id,
    ]);
    await new Promise((resolve) => setTimeout(resolve, 2100));
    await saveDrug(people.nurse.agent, patientId);
    await expect.poll(stream.ended, { timeout: 2000 }).toBe(true);
    expect(stream.changes()).toEqual([]);
  });

  it('says that something was missed when the database cut the feed', async () => {
    const people = await buildPrescribers(house);
    const { patientId } = await buildCourse(house, people.site);
    const stream = await listen(one, await agentFor(house, people.physiologist));
    await house.context.database.$client.query(
      `SELECT pg_terminate_backend(pid) FROM pg_stat_activity
        WHERE application_name = 'plimsoll-changes' AND datname = current_database() AND usename = current_user`,
    );
    await expect
      .poll(() => stream.told.map(({ event }) => event), { timeout: 5000 })
      .toContain('missed');
    await saveDrug(people.nurse.agent, patientId);
    await expect.poll(() => stream.changes().length, { timeout: 1000 }).toBeGreaterThan(0);
    stream.close();
  });
});
