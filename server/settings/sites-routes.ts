import {
  newSiteSchema,
  siteSchema,
  sitesDetailsResponseSchema,
  sitesResponseSchema,
} from '@shared/contracts/sites-contract';
import { created, ok } from '../http/answers';
import { route } from '../http/route';
import { insertSite, listSiteDetails, listSites } from './sites-repository';

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
];
