import { afterAll, beforeAll, describe, it } from 'vitest';
import { agentFor, type Agent } from '../builders/agent';
import { buildPatient, buildSite, buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

// What an administrator takes away counts at once in every server process, also in one that has just let the person in.

describe('taken away in one process, gone in the other', () => {
  let house: TestApp;
  let twin: TestApp;
  let administrator: Agent;
  let site: { id: string };
  let patientId: string;

  beforeAll(async () => {
    house = await createTestApp();
    twin = house.twin();
    const { database } = house.context;
    site = await buildSite(database);
    patientId = (await buildPatient(database, { siteId: site.id })).id;
    administrator = await agentFor(house, await buildUser(database, { roles: ['administrator'] }));
  });
  afterAll(async () => {
    await twin.close();
    await house.close();
  });

  interface Person {
    readonly id: string;
    readonly chart: (status: number) => Promise<unknown>;
  }

  /** A nurse who has just read a chart through the other process. */
  async function nurse(): Promise<Person> {
    const user = await buildUser(house.context.database, { roles: ['nurse'], siteIds: [site.id] });
    const agent = await agentFor(twin, user);
    const chart = (status: number) => agent.get(`/api/patients/${patientId}/record`).expect(status);
    await chart(200);
    return { id: user.id, chart };
  }

  it.each([
    ['the account', 401, { disabled: true }],
    ['the role', 403, { roles: ['front-desk'] }],
    ['the site', 404, { siteIds: [] }],
  ])('%s', async (_, status, change) => {
    const { id, chart } = await nurse();
    await administrator.patch(`/api/users/${id}`).send(change).expect(200);
    await chart(status);
  });

  it('the sessions', async () => {
    const { id, chart } = await nurse();
    await administrator.delete(`/api/users/${id}/sessions`).expect(204);
    await chart(401);
  });

  it('a session whose owner signed out', async () => {
    const user = await buildUser(house.context.database, { roles: ['nurse'], siteIds: [site.id] });
    const [here, there] = [await agentFor(house, user), await agentFor(twin, user)];
    Object.assign(there.cookies, here.cookies);
    await there.get('/api/users').expect(403);
    await here.post('/api/auth/sign-out').expect(204);
    await there.get('/api/users').expect(401);
  });
});
