import {
  changePasswordRequestSchema,
  firstAdministratorRequestSchema,
  forgottenPasswordRequestSchema,
  sessionResponseSchema,
  setPasswordRequestSchema,
  signInRequestSchema,
  signInResponseSchema,
  type SessionUser,
} from '@shared/contracts/accounts-contract';
import type { AppContext } from '../app-context';
import { noContent, ok } from '../http/answers';
import { createCsrf } from '../http/csrf';
import { route, type RouteDefinition } from '../http/route';
import type { Actor } from './actor';
import { createAuthenticate } from './credentials-service';
import { createKnownDevices } from './device-cookie';
import { createFirstAdministrator } from './first-administrator-service';
import { createPasswordHasher } from './password-hash';
import { askForReset, changePassword, setPassword } from './passwords-service';
import { signIn, signOut, type AccountsParts } from './sign-in-service';
import { createAddressLimit, type AddressLimit } from './sign-in-throttle';

/** The account as its own person sees it. */
const toSessionUser = ({ id, displayName, email, roles, patientId }: Actor): SessionUser => ({
  id,
  displayName,
  email,
  roles: [...roles],
  patientId,
});

function createParts(context: AppContext): AccountsParts {
  const hasher = createPasswordHasher();
  const devices = createKnownDevices(context.settings);
  const authenticate = createAuthenticate(context, { hasher, devices });
  return { hasher, devices, authenticate, csrf: createCsrf(context.settings) };
}

export function accountsRoutes(context: AppContext): RouteDefinition[] {
  const parts = createParts(context);
  const limit = createAddressLimit(context.database.$client);
  return [...sessionRoutes(context, parts, limit), ...passwordRoutes(parts, limit)];
}

const sessionRoutes = (
  { settings }: AppContext,
  parts: AccountsParts,
  limit: AddressLimit,
): RouteDefinition[] => [
  route({
    method: 'get',
    path: '/api/auth/session',
    summary: 'Who is signed in; sets the XSRF-TOKEN cookie that every write sends back',
    access: 'public',
    audit: 'none',
    transaction: 'none',
    request: {},
    response: { 200: sessionResponseSchema },
    handler: ({ actor, http }) => {
      parts.csrf.giveToken(http.request, http.response);
      const { demo, demoAccounts } = settings;
      const user = actor && toSessionUser(actor);
      return Promise.resolve(ok({ user, demo, demoAccounts: [...demoAccounts] }));
    },
  }),
  route({
    method: 'post',
    path: '/api/auth/sign-in',
    summary: 'Opens a session',
    access: 'public',
    audit: 'none',
    transaction: 'none',
    throttle: limit,
    request: { body: signInRequestSchema },
    response: { 200: signInResponseSchema },
    handler: async ({ context, http }) => {
      return ok({ user: toSessionUser(await signIn(context, parts, http)) });
    },
  }),
  route({
    method: 'post',
    path: '/api/auth/sign-out',
    summary: 'Ends the session',
    access: 'public',
    audit: 'handler',
    request: {},
    response: { 204: null },
    handler: async ({ tx, context, actor, audit, http }) => {
      await signOut(tx, context, parts.csrf, http);
      if (actor) audit({ action: 'sign-out', objectType: 'user', objectId: actor.id });
      return noContent();
    },
  }),
];

const passwordRoutes = (parts: AccountsParts, limit: AddressLimit): RouteDefinition[] => [
  route({
    method: 'post',
    path: '/api/auth/forgotten-password',
    summary: 'Sends a link to the address if it has an account; answers the same when it has none',
    access: 'public',
    audit: 'handler',
    throttle: limit,
    request: { body: forgottenPasswordRequestSchema },
    response: { 204: null },
    handler: async ({ tx, input, audit }) => {
      const objectId = await askForReset(tx, input.body.email);
      audit({ action: 'password.reset-asked', objectType: 'user', objectId });
      return noContent();
    },
  }),
  route({
    method: 'post',
    path: '/api/auth/password',
    summary: 'Sets a password by the link of a reset or an invitation',
    access: 'public',
    audit: 'handler',
    throttle: limit,
    request: { body: setPasswordRequestSchema },
    response: { 204: null },
    handler: async ({ tx, context, input, audit }) => {
      const { userId, purpose } = await setPassword(tx, context, parts.hasher, input.body);
      const event = { action: 'password.set', objectType: 'user', objectId: userId };
      audit({ ...event, details: { by: purpose } });
      return noContent();
    },
  }),
  route({
    method: 'post',
    path: '/api/auth/change-password',
    summary: 'Changes one’s own password and ends one’s other sessions',
    access: 'signed-in',
    audit: 'none',
    transaction: 'none',
    request: { body: changePasswordRequestSchema },
    response: { 204: null },
    handler: async ({ context, actor, input, http }) => {
      const given = { request: http.request, change: input.body };
      await changePassword(context, parts, actor, given);
      return noContent();
    },
  }),
  route({
    method: 'post',
    path: '/api/auth/first-administrator',
    summary: 'Makes the first administrator by the one-time link of an empty program',
    access: 'public',
    audit: 'handler',
    throttle: limit,
    request: { body: firstAdministratorRequestSchema },
    response: { 204: null },
    handler: async ({ tx, context, input, audit }) => {
      const userId = await createFirstAdministrator(tx, context, parts.hasher, input.body);
      audit({ action: 'user.first-administrator', objectType: 'user', objectId: userId });
      return noContent();
    },
  }),
];
