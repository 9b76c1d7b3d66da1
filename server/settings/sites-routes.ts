import * as z from 'zod';
import {
  changedSiteSchema,
  newSiteSchema,
  siteChangeSchema,
  siteSchema,
  sitesDetailsResponseSchema,
  sitesResponseSchema,
} from '@shared/contracts/sites-contract';
import { created, ok } from '../http/answers';
import { Failure } from '../http/failure';
import { route } from '../http/route';
import { changeSite } from './sites-service';
import { listSiteDetails, listSites } from './sites-queries';
import { insertSite } from './sites-repository';

export const sitesRoutes = [
  route({
    method: 'get',
    path: '/api/sites',
    summary: 'The sites of the program and their time zones',
    access: 'signed-in',
    audit: 'none',
    transaction: 'none',
    request: {},
    response: { 200: sitesResponseSchema },
    handler: async ({ context }) => ok({ items: await listSites(context.database) }),
  }),
  route({
    method: 'get',
    path: '/api/settings/sites',
    summary: 'The sites with their addresses and telephone numbers',
    access: { roles: ['administrator'] },
    audit: 'none',
    transaction: 'none',
    request: {},
    response: { 200: sitesDetailsResponseSchema },
    handler: async ({ context }) => ok({ items: await listSiteDetails(context.database) }),
  }),
  route({
    method: 'post',
    path: '/api/sites',
    summary: 'Adds a site',
    access: { roles: ['administrator'] },
    audit: {
      action: 'site.created',
      objectType: 'site',
      objectId: ({ result }) => result.body.id,
    },
    request: { body: newSiteSchema },
    response: { 201: siteSchema },
    constraints: { sites_name_unique: 'already-recorded' },
    handler: async ({ tx, input }) => created(await insertSite(tx, input.body)),
  }),
  route({
    method: 'put',
    path: '/api/sites/:id',
    summary: 'Changes a site; in another time zone its classes to come keep their time on the wall',
    access: { roles: ['administrator'] },
    audit: 'handler',
    request: { params: z.object({ id: z.uuid() }), body: siteChangeSchema },
    response: { 200: changedSiteSchema },
    constraints: {
      sites_name_unique: 'already-recorded',
      appointments_no_overlap: 'overlapping-appointment',
    },
    handler: async ({ tx, context, input, audit }) => {
      const { id } = input.params;
      const changed = await changeSite(tx, id, input.body, context.clock.now());
      if (changed instanceof Failure) return changed;
      const { fields, ...answer } = changed;
      const details = { fields, movedClassDates: answer.movedClassDates };
      audit({ action: 'site.changed', objectType: 'site', objectId: id, details });
      return ok(answer);
    },
  }),
];
