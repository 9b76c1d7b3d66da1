import fc from 'fast-check';
import * as z from 'zod';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { roles } from '@shared/contracts/accounts-contract';
import { encodeCursor } from '../../server/http/cursor';
import { featureRoutes } from '../../server/features';
import type { RouteDefinition } from '../../server/http/route';
import { buildAccessWorld, type AccessWorld } from '../builders/access-world';
import { valuesFor } from '../builders/schema-values';
import { createTestApp, type TestApp } from '../builders/test-app';
import { accessTable } from './access-table';

const SEED = 20261201;
const SAMPLES = 12;

/** Readable by ISO 8601, and beyond what a calendar, the database or arithmetic on either bears. */
const impossible: Readonly<Record<string, readonly string[]>> = {
  date: ['0000-01-01', '0001-01-01', '1899-12-31', '2200-01-01', '9999-12-31'],
  'date-time': ['0000-01-01T00:00:00Z', '0001-01-01T00:00:00+14:00', '9999-12-31T23:59:59-12:00'],
};

type Path = readonly (string | number)[];

/** Where a value holds a date or an instant. */
function datesIn(value: unknown, path: Path = []): { path: Path; format: string }[] {
  if (typeof value === 'string') {
    if (/^\d{4}-\d\d-\d\d$/.test(value)) return [{ path, format: 'date' }];
    return /^\d{4}-\d\d-\d\dT[\d:.]+Z$/.test(value) ? [{ path, format: 'date-time' }] : [];
  }
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, inner]) => datesIn(inner, [...path, key]));
}

function withAt(value: unknown, [key, ...rest]: Path, put: string): unknown {
  if (key === undefined) return put;
  const copy = structuredClone(value) as Record<string, unknown>;
  copy[key] = withAt(copy[key], rest, put);
  return copy;
}

interface Part {
  readonly name: string;
  readonly part: 'query' | 'body';
  readonly schema: z.ZodType;
}

describe('a date that no calendar of a clinic holds', () => {
  let house: TestApp;
  let world: AccessWorld;
  let routes: Map<string, RouteDefinition>;
  let id: string;

  const names = Object.keys(accessTable);

  beforeAll(async () => {
    house = await createTestApp();
    world = await buildAccessWorld(house);
    id = (await world.newRecord()).patientId;
    routes = new Map(
      featureRoutes(house.context).map((route) => [
        `${route.method.toUpperCase()} ${route.path}`,
        route,
      ]),
    );
  });
  afterAll(() => house.close());

  function callerOf(name: string) {
    const who = accessTable[name]?.who;
    const role = roles.find((one) => who === 'signed-in' || who === 'anyone' || who?.includes(one));
    return role ? world.at[role] : world.nobody;
  }

  function send({ name, part }: Pick<Part, 'name' | 'part'>, value: unknown) {
    const route = routes.get(name);
    if (!route) throw new Error(`${name} is not mounted`);
    const path = route.path.replaceAll(/:\w+/g, id);
    const query =
      part === 'query' ? `?${new URLSearchParams(value as Record<string, string>)}` : '';
    const call = callerOf(name)
      [route.method](`${path}${query}`)
      .set('Idempotency-Key', SEED.toString());
    return part === 'query' ? call : call.send(value as object);
  }

  function partsOf(name: string): Part[] {
    const { query, body } = routes.get(name)?.request ?? {};
    return [
      ...(query ? [{ name, part: 'query', schema: query } as const] : []),
      ...(body instanceof z.ZodType ? [{ name, part: 'body', schema: body } as const] : []),
    ];
  }

  const dated: string[] = [];

  it.each(names)('%s refuses it in every field that takes a date', async (name) => {
    for (const part of partsOf(name)) {
      const values = fc.sample(valuesFor(part.schema), { numRuns: SAMPLES, seed: SEED });
      const tried = new Set<string>();
      for (const value of values) {
        for (const { path, format } of datesIn(value)) {
          if (tried.has(path.join('.'))) continue;
          tried.add(path.join('.'));
          dated.push(`${name} ${path.join('.')}`);
          for (const put of impossible[format] ?? []) {
            const reply = await send(part, withAt(value, path, put));
            expect([path.join('.'), put, reply.status]).toEqual([path.join('.'), put, 422]);
            const { errors } = reply.body as { errors: { path: string }[] };
            expect(errors.map((error) => error.path)).toContain(path.join('.'));
          }
        }
      }
    }
  });

  it('has been tried wherever the contracts name a date', () => {
    const formats = (schema: unknown): number =>
      JSON.stringify(schema).split('"format":"date').length - 1;
    for (const name of names) {
      for (const { schema } of partsOf(name)) {
        const known = formats(z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }));
        if (known > 0)
          expect(dated.filter((one) => one.startsWith(`${name} `)).length).toBeGreaterThan(0);
      }
    }
    expect(dated.length).toBeGreaterThan(20);
  });

  it.each(names)('%s refuses it in a cursor', async (name) => {
    for (const { part, schema } of partsOf(name)) {
      if (!(schema instanceof z.ZodObject) || !('cursor' in schema.shape)) continue;
      const required = z.toJSONSchema(schema, { io: 'input', unrepresentable: 'any' }).required;
      const sample = fc.sample(valuesFor(schema), { numRuns: 1, seed: SEED })[0] as object;
      const base = Object.fromEntries(
        Object.entries(sample).filter(([key]) => required?.includes(key)),
      );
      for (const at of impossible['date-time'] ?? []) {
        const reply = await send({ name, part }, { ...base, cursor: encodeCursor([at, id]) });
        expect([at, reply.status]).not.toEqual([at, 500]);
      }
    }
  });
});
