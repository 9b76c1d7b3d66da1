import {
  calendarLinkSchema,
  calendarParamsSchema,
  calendarStateSchema,
} from '@shared/contracts/calendar-contract';
import { ok } from '../http/answers';
import { fail } from '../http/failure';
import { route, textAnswer, type RouteDefinition } from '../http/route';
import {
  calendarEntries,
  calendarMadeAt,
  calendarOf,
  patientOfCalendar,
  renewCalendarToken,
} from './calendar-service';

const state = route({
  method: 'get',
  path: '/api/my/calendar-link',
  summary: 'Since when one’s own calendar has an address',
  access: { roles: ['patient'] },
  audit: {
    action: 'calendar.link-seen',
    objectType: 'patient',
    objectId: ({ actor }) => actor?.patientId ?? null,
    patientId: ({ actor }) => actor?.patientId ?? null,
  },
  request: {},
  response: { 200: calendarStateSchema },
  handler: async ({ tx, actor }) => {
    if (actor.patientId === null) return fail('not-found');
    const madeAt = await calendarMadeAt(tx, actor.patientId);
    return ok({ madeAt: madeAt?.toISOString() ?? null });
  },
});

const renew = route({
  method: 'post',
  path: '/api/my/calendar-link',
  summary: 'Makes the address of one’s own calendar anew',
  access: { roles: ['patient'] },
  audit: {
    action: 'calendar.link-renewed',
    objectType: 'patient',
    objectId: ({ actor }) => actor?.patientId ?? null,
    patientId: ({ actor }) => actor?.patientId ?? null,
  },
  request: {},
  response: { 200: calendarLinkSchema },
  handler: async ({ tx, actor, context }) => {
    if (actor.patientId === null) return fail('not-found');
    const token = await renewCalendarToken(tx, actor.patientId, context.clock.now());
    return ok({ url: `${context.settings.origin}/api/calendar/${token}.ics` });
  },
});

const read = route({
  method: 'get',
  path: '/api/calendar/:token.ics',
  summary: 'A patient’s appointments by RFC 5545, for a calendar program',
  access: 'public',
  audit: 'handler',
  request: { params: calendarParamsSchema },
  response: { 200: textAnswer('text/calendar; charset=utf-8') },
  handler: async ({ tx, context, input, audit }) => {
    const patientId = await patientOfCalendar(tx, input.params.token);
    if (patientId === undefined) return fail('not-found');
    audit({ action: 'calendar.read', objectType: 'patient', objectId: patientId, patientId });
    const entries = await calendarEntries(tx, patientId, context.clock.now());
    const headers = { 'Cache-Control': 'private, no-store' };
    return { ...ok(calendarOf(entries, new URL(context.settings.origin).hostname)), headers };
  },
});

export const calendarRoutes: RouteDefinition[] = [state, renew, read];
