import fc from 'fast-check';
import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { roles } from '@shared/contracts/accounts-contract';
import { featureRoutes } from '../../server/features';
import type { RouteDefinition } from '../../server/http/route';
import { buildAccessWorld, type AccessWorld, type PatientRecord } from '../builders/access-world';
import { valuesFor } from '../builders/schema-values';
import { createTestApp, type TestApp } from '../builders/test-app';
import { accessTable } from './access-table';

const CASES = 25;
const SEED = 20261201;

describe('whatever is sent', () => {
  let house: TestApp;
  let world: AccessWorld;
  let record: PatientRecord;
  let routes: Map<string, RouteDefinition>;

  beforeAll(async () => {
    house = await createTestApp();
    world = await buildAccessWorld(house);
    record = await world.newRecord();
    routes = new Map(
      featureRoutes(house.context).map((route) => [
        `${route.method.toUpperCase()} ${route.path}`,
        route,
      ]),
    );
  });
  afterAll(() => house.close());

  /** Ids that exist, so that what is sent gets past the door. */
  const known = () => [
    record.patientId,
    record.siteId,
    record.classDateId,
    record.classTemplateId,
    record.appointmentId,
    record.prescriptionId,
  ];

  /** The id that the path asks for, so that most calls arrive. */
  function idFor(path: string): string {
    const ids: Record<string, string> = {
      patients: record.patientId,
      prescriptions: record.prescriptionId,
      'class-dates': record.classDateId,
      'class-templates': record.classTemplateId,
      appointments: record.appointmentId,
    };
    return ids[path.split('/')[2] ?? ''] ?? record.siteId;
  }

  /** Puts known ids in the place of made-up ones, now and then. */
  function withKnownIds(value: unknown, pick: number): unknown {
    const text = JSON.stringify(value) ?? 'null';
    let index = pick;
    return JSON.parse(
      text.replaceAll(/"[0-9a-f]{8}-[0-9a-f]{4}-7[0-9a-f-]{22}"/g, (found) => {
        index += 1;
        return index % 3 === 0 ? found : JSON.stringify(known()[index % known().length]);
      }),
    ) as unknown;
  }

  function callers(name: string): (typeof world)['nobody'][] {
    const who = accessTable[name]?.who;
    if (who === 'anyone') return [world.nobody, world.at.nurse];
    return roles
      .filter((role) => who === 'signed-in' || who?.includes(role))
      .map((role) => world.at[role]);
  }

  const bodyOf = (route: RouteDefinition) =>
    route.request.body instanceof z.ZodType
      ? fc.oneof(
          { weight: 4, arbitrary: valuesFor(route.request.body) },
          { weight: 1, arbitrary: fc.jsonValue() },
        )
      : fc.constant(undefined);
  const queryOf = (route: RouteDefinition) =>
    route.request.query ? valuesFor(route.request.query) : fc.constant({});

  const names = Object.keys(accessTable).filter((name) => name !== 'POST /api/auth/sign-out');

  it.each(names)('%s never fails on the server’s side', async (name) => {
    const route = routes.get(name);
    if (!route) throw new Error(`${name} is not mounted`);
    const agents = callers(name);
    await fc.assert(
      fc.asyncProperty(bodyOf(route), queryOf(route), fc.nat(50), async (body, query, pick) => {
        const agent = agents[pick % agents.length] ?? world.nobody;
        const path = route.path
          .replace(':id', idFor(route.path))
          .replace(/:\w+/, record.classDateId);
        const asked = new URLSearchParams(withKnownIds(query, pick) as Record<string, string>);
        const call = agent[route.method](`${path}?${asked}`).set('Idempotency-Key', `${pick}`);
        const sent =
          body === undefined
            ? call
            : call.type('json').send(JSON.stringify(withKnownIds(body, pick)));
        const reply = await sent;
        const told =
          reply.status !== 500 ? '' : `${reply.status} ${JSON.stringify(house.logged().at(-2))}`;
        expect(told).toBe('');
      }),
      { numRuns: CASES, seed: SEED, endOnFailure: true },
    );
  });

  it('takes JSON as deep as it is long for what it is', async () => {
    const deep = `${'['.repeat(40_000)}"\\u0041"${']'.repeat(40_000)}`;
    const reply = await world.at.nurse.post('/api/patients/search').type('json').send(deep);
    expect(reply.status).toBe(422);
  });

  it('refuses text that cannot be stored, wherever it stands', async () => {
    const send = (body: string) =>
      world.at.administrator.post('/api/sites').type('json').send(body);
    const site = (name: string) =>
      `{"name":"${name}","timeZone":"UTC","address":"1 Wharf Road","phone":"1"}`;
    for (const name of ['a\\u0000b', '\\ud800', '\\udc00x']) {
      expect((await send(site(name)).expect(422)).body.errors[0].path).toBe('name');
    }
    await send(site('\\ud83d\\udedf buoy')).expect(201);
    await world.at.administrator.get('/api/users?cursor=a%00b').expect(422);
  });
});
