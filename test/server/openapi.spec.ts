import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { featureRoutes } from '../../server/features';
import { agentFor } from '../builders/agent';
import { buildUser } from '../builders/people';
import { createTestApp, type TestApp } from '../builders/test-app';

interface Operation {
  operationId: string;
  parameters: { name: string; in: string; required: boolean; schema: object }[];
  requestBody?: { content: Record<string, { schema: { properties?: object } }> };
  responses: Record<string, object>;
  security: Record<string, string[]>[];
}

describe('the description of the API', () => {
  let house: TestApp;
  let document: {
    openapi: string;
    paths: Record<string, Record<string, Operation>>;
    components: object;
  };

  beforeAll(async () => {
    house = await createTestApp();
    const agent = await agentFor(house, await buildUser(house.context.database));
    document = (await agent.get('/api/openapi.json').expect(200)).body;
  });
  afterAll(() => house.close());

  const operations = () =>
    Object.entries(document.paths).flatMap(([path, methods]) =>
      Object.entries(methods).map(([method, operation]) => ({ path, method, operation })),
    );

  it('lists every mounted route, and no other', () => {
    const listed = operations().map(({ path, method }) => `${method} ${path}`);
    const mounted = featureRoutes(house.context).map(
      ({ method, path }) => `${method} ${path.replaceAll(/:(\w+)/g, '{$1}')}`,
    );
    expect(listed.sort()).toEqual(mounted.sort());
    expect(document.openapi).toBe('3.1.0');
  });

  it('names every operation once and declares each parameter of its path', () => {
    const ids = operations().map(({ operation }) => operation.operationId);
    expect(new Set(ids).size).toBe(ids.length);
    for (const { path, operation } of operations()) {
      const named = [...path.matchAll(/\{(\w+)\}/g)].map((match) => match[1]);
      const declared = operation.parameters.filter((parameter) => parameter.in === 'path');
      expect([path, declared.map((parameter) => parameter.name)]).toEqual([path, named]);
      expect(declared.every((parameter) => parameter.required)).toBe(true);
    }
  });

  it('tells what is taken and answered, what a failure looks like, and what a call must carry', () => {
    const signIn = document.paths['/api/auth/sign-in']?.['post'];
    const body = signIn?.requestBody?.content['application/json']?.schema;
    expect(body).toMatchObject({
      type: 'object',
      required: ['email', 'password'],
      additionalProperties: false,
    });
    expect(signIn?.responses).toMatchObject({
      200: { content: { 'application/json': { schema: expect.any(Object) } } },
      default: { $ref: '#/components/responses/Problem' },
    });
    expect(signIn?.security).toEqual([{ csrf: [] }]);
    const users = document.paths['/api/users']?.['get'];
    expect(users?.security).toEqual([{ session: [] }]);
    expect(users?.parameters.find((parameter) => parameter.name === 'limit')).toMatchObject({
      in: 'query',
      required: false,
      schema: { type: 'integer', minimum: 1, maximum: 100, default: 25 },
    });
    expect(JSON.stringify(document)).not.toContain('"$schema"');
  });

  it('points nowhere that is not there', () => {
    const text = JSON.stringify(document);
    for (const [, pointer = ''] of text.matchAll(/"\$ref":"#([^"]+)"/g)) {
      const found = pointer
        .split('/')
        .slice(1)
        .reduce<unknown>((at, key) => (at as Record<string, unknown> | undefined)?.[key], document);
      expect([pointer, found]).toEqual([pointer, expect.any(Object)]);
    }
  });

  it('is for staff', async () => {
    const patient = await agentFor(
      house,
      await buildUser(house.context.database, { roles: ['patient'] }),
    );
    await patient.get('/api/openapi.json').expect(403);
  });
});
