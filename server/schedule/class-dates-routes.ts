import * as z from 'zod';
import {
  classAppointmentsResponseSchema,
  classDateSchema,
  classDatesQuerySchema,
  classDatesResponseSchema,
} from '@shared/contracts/schedule-contract';
import { ok } from '../http/answers';
import { fail } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { listClassAppointments } from './appointments-queries';
import { findClassDate, listClassDates } from './class-dates-queries';
import { rosterRoles } from './schedule-policy';
import { readTimeZone } from './series-queries';

const list = route({
  method: 'get',
  path: '/api/class-dates',
  summary: 'The class dates of a site and how many places are taken',
  access: 'signed-in',
  audit: 'none',
  request: { query: classDatesQuerySchema },
  response: { 200: classDatesResponseSchema },
  handler: async ({ tx, input: { query } }) => {
    const items = await listClassDates(tx, query);
    if (items.length === 0 && (await readTimeZone(tx, query.siteId)) === null) {
      return fail('not-found');
    }
    return ok({ items, nextCursor: null });
  },
});

const one = route({
  method: 'get',
  path: '/api/class-dates/:id',
  summary: 'One class date',
  access: 'signed-in',
  audit: 'none',
  request: { params: z.object({ id: z.uuid() }) },
  response: { 200: classDateSchema },
  handler: async ({ tx, input }) => {
    const found = await findClassDate(tx, input.params.id);
    return found === null ? fail('not-found') : ok(found);
  },
});

const appointments = route({
  method: 'get',
  path: '/api/class-dates/:id/appointments',
  summary: 'Who is in a class date, and who was and cancelled',
  access: { roles: rosterRoles },
  audit: {
    action: 'class-date.appointments-read',
    objectType: 'class-date',
    objectId: ({ input }) => input.params.id,
    patientId: ({ result }) => [...new Set(result.body.items.map(({ patientId }) => patientId))],
  },
  request: { params: z.object({ id: z.uuid() }) },
  response: { 200: classAppointmentsResponseSchema },
  handler: async ({ actor, tx, input }) => {
    if ((await findClassDate(tx, input.params.id)) === null) return fail('not-found');
    const items = await listClassAppointments(tx, input.params.id, actor.siteIds);
    return ok({ items });
  },
});

export const classDatesRoutes: RouteDefinition[] = [list, one, appointments];
