import {
  messagePreferencesRequestSchema,
  messagePreferencesSchema,
  unsubscribeParamsSchema,
} from '@shared/contracts/messages-contract';
import { noContent, ok } from '../http/answers';
import { fail } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { isOneClick } from './one-click';
import {
  patientOfUnsubscribing,
  readPreferences,
  setPreferences,
  unsubscribePage,
} from './preferences-service';

const read = route({
  method: 'get',
  path: '/api/my/message-preferences',
  summary: 'What a patient wants to be sent by e-mail',
  access: { roles: ['patient'] },
  audit: {
    action: 'message-preferences.read',
    objectType: 'patient',
    objectId: ({ actor }) => actor?.patientId ?? null,
    patientId: ({ actor }) => actor?.patientId ?? null,
  },
  request: {},
  response: { 200: messagePreferencesSchema },
  handler: async ({ tx, actor }) =>
    actor.patientId === null ? fail('not-found') : ok(await readPreferences(tx, actor.patientId)),
});

const change = route({
  method: 'put',
  path: '/api/my/message-preferences',
  summary: 'Says what a patient wants to be sent by e-mail',
  access: { roles: ['patient'] },
  audit: {
    action: 'message-preferences.changed',
    objectType: 'patient',
    objectId: ({ actor }) => actor?.patientId ?? null,
    patientId: ({ actor }) => actor?.patientId ?? null,
    details: ({ input }) => ({ reminders: input.body.reminders }),
  },
  request: { body: messagePreferencesRequestSchema },
  response: { 200: messagePreferencesSchema },
  handler: async ({ tx, actor, context, input: { body } }) => {
    if (actor.patientId === null) return fail('not-found');
    await setPreferences(tx, actor.patientId, body, context.clock.now());
    return ok(body);
  },
});

/** A scanner of mail opens every link, so reading stops nothing: the page asks. */
const ask = route({
  method: 'get',
  path: '/api/unsubscribe/:token',
  summary: 'Leads to the page that asks whether to stop reminders',
  access: 'public',
  audit: 'none',
  request: { params: unsubscribeParamsSchema },
  response: { 303: null },
  handler: ({ context, input }) => {
    const location = unsubscribePage(context.settings.origin, input.params.token);
    return Promise.resolve({ status: 303, headers: { Location: location } });
  },
});

const stop = route({
  method: 'post',
  path: '/api/unsubscribe/:token',
  summary: 'Stops a patient’s reminders, at one press in a mail program (RFC 8058)',
  access: 'public',
  csrf: 'exempt',
  audit: 'handler',
  bodyLimit: 1024,
  request: { params: unsubscribeParamsSchema, body: 'raw' },
  response: { 204: null },
  handler: async ({ tx, context, input, audit, http }) => {
    const type = http.request.get('content-type') ?? '';
    if (!(await isOneClick(input.body, type))) return fail('invalid-request');
    const patientId = await patientOfUnsubscribing(tx, input.params.token);
    if (patientId === undefined) return fail('link-expired');
    await setPreferences(tx, patientId, { reminders: false }, context.clock.now());
    audit({ action: 'reminders.stopped', objectType: 'patient', objectId: patientId, patientId });
    return noContent();
  },
});

export const preferencesRoutes: RouteDefinition[] = [read, change, ask, stop];
