import { fieldsOf, filtered, readOpenApi, typeOf } from './read-openapi';

const document = {
  info: { title: 'Plimsoll', version: '1.0.0' },
  paths: {
    '/api/users/{id}': {
      patch: {
        operationId: 'patch_api_users_id',
        summary: 'Changes an account',
        description: 'For these roles: administrator.',
        tags: ['users'],
        parameters: [
          { name: 'id', in: 'path', required: true, schema: { type: 'string', format: 'uuid' } },
        ],
        requestBody: {
          content: {
            'application/json': {
              schema: {
                type: 'object',
                properties: { roles: { type: 'array', items: { enum: ['nurse'] }, minItems: 1 } },
              },
            },
          },
        },
        responses: { 204: { description: 'Done' }, default: {} },
        security: [{ session: [], csrf: [] }],
      },
    },
    '/api/health': { get: { summary: 'Health', tags: ['health'], security: [] } },
  },
};

describe('readOpenApi', () => {
  const reference = readOpenApi(document);

  it('orders calls by area and tells who may make them', () => {
    expect(reference.areas.map(({ name }) => name)).toEqual(['health', 'users']);
    expect(reference.areas[1]?.operations[0]).toMatchObject({
      method: 'PATCH',
      path: '/api/users/{id}',
      who: 'For these roles: administrator.',
      needsToken: true,
    });
    expect(reference.areas[0]?.operations[0]).toMatchObject({ needsToken: false, parts: [] });
  });

  it('tells each part with its fields', () => {
    expect(reference.areas[1]?.operations[0]?.parts).toEqual([
      {
        heading: 'In the address',
        fields: [{ name: 'id', type: 'string (uuid)', required: true, bounds: '' }],
      },
      {
        heading: 'Body',
        fields: [
          {
            name: 'roles',
            type: 'list of one of: nurse',
            required: false,
            bounds: 'at least items: 1',
          },
        ],
      },
      {
        heading: 'Answer 204',
        fields: [{ name: '', type: 'nothing', required: false, bounds: '' }],
      },
    ]);
  });

  it('finds calls by words, and reads what is no description as nothing', () => {
    expect(filtered(reference, 'users PATCH').map(({ name }) => name)).toEqual(['users']);
    expect(filtered(reference, '')).toHaveLength(2);
    expect(readOpenApi(null).areas).toEqual([]);
  });
});

describe('fieldsOf', () => {
  it('follows objects in lists and in choices', () => {
    const rate = { type: 'integer', minimum: 20, maximum: 300 };
    const item = { type: 'object', properties: { heartRate: rate }, required: ['heartRate'] };
    const schema = {
      type: 'object',
      properties: {
        readings: { type: 'array', items: item },
        last: { anyOf: [item, { type: 'null' }] },
        count: { type: 'integer', maximum: Number.MAX_SAFE_INTEGER },
      },
      required: ['readings'],
    };
    expect(fieldsOf(schema)).toEqual([
      { name: 'readings', type: 'list of object', required: true, bounds: '' },
      { name: 'readings[].heartRate', type: 'integer', required: true, bounds: 'from 20, to 300' },
      { name: 'last', type: 'object or null', required: false, bounds: '' },
      { name: 'last.heartRate', type: 'integer', required: true, bounds: 'from 20, to 300' },
      { name: 'count', type: 'integer', required: false, bounds: '' },
    ]);
  });

  it('says constants and unknown types', () => {
    expect(typeOf({ const: 'ok' })).toBe('"ok"');
    expect(typeOf({})).toBe('any');
  });
});
