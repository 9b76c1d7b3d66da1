import * as z from 'zod';
import {
  classTemplateChangeSchema,
  classTemplatesQuerySchema,
  classTemplatesResponseSchema,
  newClassTemplateSchema,
  savedClassTemplateSchema,
} from '@shared/contracts/class-templates-contract';
import { created, ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import {
  findClassTemplate,
  listActivePrices,
  listClassTemplates,
} from './class-templates-repository';
import { changeClassTemplate, createClassTemplate } from './class-templates-service';
import { mayPlan, planningRoles } from './schedule-policy';

const list = route({
  method: 'get',
  path: '/api/class-templates',
  summary: 'The classes of a site, and the prices that a class may have',
  access: { roles: planningRoles },
  audit: 'none',
  request: { query: classTemplatesQuerySchema },
  response: { 200: classTemplatesResponseSchema },
  handler: async ({ actor, tx, input }) => {
    const { siteId } = input.query;
    if (!mayPlan(actor, siteId)) return fail('not-found');
    const items = await listClassTemplates(tx, siteId);
    return ok({ items, nextCursor: null, prices: await listActivePrices(tx) });
  },
});

const create = route({
  method: 'post',
  path: '/api/class-templates',
  summary: 'Adds a class and makes its dates ahead',
  access: { roles: planningRoles },
  audit: {
    action: 'class.created',
    objectType: 'class-template',
    objectId: ({ result }) => result.body.template.id,
  },
  request: { body: newClassTemplateSchema },
  response: { 201: savedClassTemplateSchema },
  handler: async ({ actor, context, tx, input }) => {
    if (!mayPlan(actor, input.body.siteId)) return fail('not-found');
    const saved = await createClassTemplate(tx, context.clock.now(), input.body);
    return saved === null ? fail('not-found') : created(saved);
  },
});

const change = route({
  method: 'put',
  path: '/api/class-templates/:id',
  summary: 'Changes a class and its dates to come',
  access: { roles: planningRoles },
  audit: {
    action: 'class.changed',
    objectType: 'class-template',
    objectId: ({ input }) => input.params.id,
  },
  request: { params: z.object({ id: z.uuid() }), body: classTemplateChangeSchema },
  response: { 200: savedClassTemplateSchema },
  handler: async ({ actor, context, tx, input: { params, body } }) => {
    const known = await findClassTemplate(tx, params.id);
    if (known === null || !mayPlan(actor, known.siteId)) return fail('not-found');
    const saved = await changeClassTemplate(tx, context.clock.now(), params.id, body);
    return saved instanceof Failure ? saved : ok(saved);
  },
});

export const classTemplatesRoutes: RouteDefinition[] = [list, create, change];
