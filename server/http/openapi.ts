import * as z from 'zod';
import { problemSchema } from '@shared/contracts/problem-contract';
import type { RequestShape, RouteDefinition } from './route';

type Json = Record<string, unknown>;

const schemaOf = (schema: z.ZodType, io: 'input' | 'output'): Json => {
  const { $schema: _draft, ...json } = z.toJSONSchema(schema, { io, unrepresentable: 'any' });
  return json;
};

/** Parameters of one place, from the properties of its object schema. */
function parametersIn(place: 'path' | 'query' | 'header', schema: z.ZodType | undefined): Json[] {
  if (!schema) return [];
  const { properties = {}, required = [] } = schemaOf(schema, 'input') as {
    properties?: Record<string, Json>;
    required?: string[];
  };
  return Object.entries(properties).map(([name, property]) => ({
    name,
    in: place,
    required: place === 'path' || required.includes(name),
    schema: property,
  }));
}

function requestBody({ body }: RequestShape): Json | undefined {
  if (!body) return undefined;
  const schema = body === 'raw' ? { type: 'string' } : schemaOf(body, 'input');
  return { required: true, content: { 'application/json': { schema } } };
}

function contentOf(answer: RouteDefinition['response'][number]): Json | undefined {
  if (answer === null || answer === undefined) return undefined;
  if ('stream' in answer) return { [answer.stream]: { schema: { type: 'string' } } };
  if ('file' in answer) {
    return { [answer.file]: { schema: { type: 'string', contentEncoding: 'binary' } } };
  }
  if ('text' in answer) return { [answer.text]: { schema: { type: 'string' } } };
  return { 'application/json': { schema: schemaOf(answer, 'output') } };
}

function responsesOf(route: RouteDefinition): Json {
  const responses: Json = { default: { $ref: '#/components/responses/Problem' } };
  for (const [status, answer] of Object.entries(route.response)) {
    const content = contentOf(answer);
    responses[status] = content
      ? { description: 'Done', content }
      : { description: 'Done, no content' };
  }
  return responses;
}

function whoMayCall({ access }: RouteDefinition): string {
  if (access === 'public') return 'Anyone may call it.';
  if (access === 'signed-in') return 'For anyone signed in.';
  return `For these roles: ${access.roles.join(', ')}.`;
}

function headersOf(route: RouteDefinition): Json[] {
  const listed = parametersIn('header', route.request.headers);
  if (!route.idempotent) return listed;
  const schema = { type: 'string', minLength: 1, maxLength: 255 };
  return [...listed, { name: 'Idempotency-Key', in: 'header', required: true, schema }];
}

const openApiPath = (path: string): string => path.replaceAll(/:(\w+)/g, '{$1}');

function operationOf(route: RouteDefinition): Json {
  const { request, method } = route;
  const guarded = method !== 'get' && route.csrf !== 'exempt';
  const body = requestBody(request);
  return {
    operationId: `${method}${openApiPath(route.path).replaceAll(/[^A-Za-z0-9]+/g, '_')}`,
    summary: route.summary,
    description: whoMayCall(route),
    tags: [route.path.split('/')[2] ?? 'api'],
    parameters: [
      ...parametersIn('path', request.params),
      ...parametersIn('query', request.query),
      ...headersOf(route),
    ],
    ...(body && { requestBody: body }),
    responses: responsesOf(route),
    security: route.access === 'public' && !guarded ? [] : [securityOf(route, guarded)],
  };
}

function securityOf(route: RouteDefinition, guarded: boolean): Json {
  return {
    ...(route.access !== 'public' && { session: [] }),
    ...(guarded && { csrf: [] }),
  };
}

/** OpenAPI 3.1, told from the same declarations that the server parses by. */
export function openApiOf(
  routes: readonly RouteDefinition[],
  server: { origin: string; version: string; sessionCookie: string },
): Json {
  const paths: Record<string, Json> = {};
  for (const route of routes) {
    const path = openApiPath(route.path);
    paths[path] = { ...paths[path], [route.method]: operationOf(route) };
  }
  return {
    openapi: '3.1.0',
    info: { title: 'Plimsoll', version: server.version },
    servers: [{ url: server.origin }],
    paths,
    components: {
      securitySchemes: {
        session: { type: 'apiKey', in: 'cookie', name: server.sessionCookie },
        csrf: { type: 'apiKey', in: 'header', name: 'X-XSRF-TOKEN' },
      },
      responses: {
        Problem: {
          description: 'What went wrong, and what to do about it',
          content: { 'application/problem+json': { schema: schemaOf(problemSchema, 'output') } },
        },
      },
    },
  };
}
