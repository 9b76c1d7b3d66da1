import { afterAll, beforeAll, beforeEach } from 'vitest';
import type { Role } from '@shared/contracts/accounts-contract';
import type { PatientListItem, PatientSearchResponse } from '@shared/contracts/patients-contract';
import { agentFor, type Agent } from './agent';
import { buildPatient, buildSite, buildUser } from './people';
import { createTestApp, type TestApp } from './test-app';

export async function pageOf(agent: Agent, body: object): Promise<PatientSearchResponse> {
  const reply = await agent.post('/api/patients/search').send(body).expect(200);
  return reply.body as PatientSearchResponse;
}

/** Every page of a list in turn. @param between is done after each page */
export async function allPages(
  agent: Agent,
  body: object,
  between: () => Promise<unknown> = () => Promise.resolve(),
): Promise<PatientListItem[]> {
  const items: PatientListItem[] = [];
  let cursor: string | null = null;
  do {
    const page: PatientSearchResponse = await pageOf(agent, { ...body, cursor });
    items.push(...page.items);
    cursor = page.nextCursor;
    await between();
  } while (cursor !== null);
  return items;
}

/** The server for a spec file about patients: each test has a site of its own, with a nurse. */
export function patientsHouse() {
  let house: TestApp;
  let siteId: string;
  let nurse: Agent;

  const at = (roles: readonly Role[], siteIds: readonly string[]) =>
    buildUser(house.context.database, { roles, siteIds }).then((user) => agentFor(house, user));

  beforeAll(async () => {
    house = await createTestApp();
  });
  afterAll(() => house.close());
  beforeEach(async () => {
    siteId = (await buildSite(house.context.database)).id;
    nurse = await at(['nurse'], [siteId]);
  });

  return {
    get testApp() {
      return house;
    },
    get siteId() {
      return siteId;
    },
    get nurse() {
      return nurse;
    },
    at,
    patient: (given: Partial<Parameters<typeof buildPatient>[1]> = {}) =>
      buildPatient(house.context.database, { siteId, ...given }),
  };
}
