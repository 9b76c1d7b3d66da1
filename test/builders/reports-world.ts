import type { Role } from '@shared/contracts/accounts-contract';
import type {
  completionPatientsSchema,
  CompletionReport,
} from '@shared/contracts/reports-contract';
import type * as z from 'zod';
import { agentFor, type Agent } from './agent';
import { buildCourses } from './courses';
import { buildSite, buildUser } from './people';
import { createTestApp, type TestApp } from './test-app';

type CompletionPatients = z.infer<typeof completionPatientsSchema>;

/** A span that holds every course of the builders' two years. */
export const WHOLE = { from: '2025-01-01', to: '2027-01-01' };

/** A site whose director reads reports, over HTTP. */
export interface ReportsWorld {
  readonly house: TestApp;
  readonly site: Awaited<ReturnType<typeof buildSite>>;
  readonly director: Agent;
  readonly addCourse: Awaited<ReturnType<typeof buildCourses>>;
  readonly agentOf: (role: Role, siteIds?: readonly string[]) => Promise<Agent>;
  readonly close: () => Promise<void>;
}

export async function buildReportsWorld(timeZone = 'America/New_York'): Promise<ReportsWorld> {
  const house = await createTestApp();
  const { database } = house.context;
  const site = await buildSite(database, { timeZone });
  const agentOf = async (role: Role, siteIds: readonly string[] = [site.id]) =>
    agentFor(house, await buildUser(database, { roles: [role], siteIds }));
  return {
    house,
    site,
    director: await agentOf('director'),
    addCourse: await buildCourses(database, site),
    agentOf,
    close: () => house.close(),
  };
}

type Query = Readonly<Record<string, string>>;

const queryOf = (query: Query): string => new URLSearchParams({ ...WHOLE, ...query }).toString();

export async function readCompletion(agent: Agent, query: Query = {}): Promise<CompletionReport> {
  const reply = await agent.get(`/api/reports/completion?${queryOf(query)}`).expect(200);
  return reply.body as CompletionReport;
}

export async function readCompletionCsv(agent: Agent, query: Query = {}) {
  return agent.get(`/api/reports/completion.csv?${queryOf(query)}`).expect(200);
}

/** Every page of the list behind a count, and the total that the first page tells. */
export async function readBehind(
  agent: Agent,
  query: Query,
): Promise<Pick<CompletionPatients, 'total' | 'items'>> {
  const path = `/api/reports/completion/patients?${queryOf(query)}`;
  const first = (await agent.get(path).expect(200)).body as CompletionPatients;
  const items = [...first.items];
  for (let cursor = first.nextCursor; cursor !== null;) {
    const page = (await agent.get(`${path}&cursor=${cursor}`).expect(200))
      .body as CompletionPatients;
    items.push(...page.items);
    cursor = page.nextCursor;
  }
  return { total: first.total, items };
}
