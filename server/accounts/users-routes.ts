import * as z from 'zod';
import {
  newUserSchema,
  userChangeSchema,
  userSchema,
  usersQuerySchema,
  usersResponseSchema,
} from '@shared/contracts/accounts-contract';
import { created, noContent, ok } from '../http/answers';
import { decodeCursor, pageOf } from '../http/cursor';
import { fail } from '../http/failure';
import { route } from '../http/route';
import { invitePatient } from './patient-account-service';
import { findUser, listUsers } from './users-repository';
import { changeUser, endUserSessions, inviteAgain, inviteUser } from './users-service';

const byId = z.object({ id: z.uuid() });
const cursorKeys = z.tuple([z.string(), z.uuid()]);
const access = { roles: ['administrator'] } as const;

export const usersRoutes = [
  route({
    method: 'get',
    path: '/api/users',
    summary: 'All accounts, by name',
    access,
    audit: { action: 'users.listed', objectType: 'user' },
    request: { query: usersQuerySchema },
    response: { 200: usersResponseSchema },
    handler: async ({ tx, input: { query } }) => {
      const after = query.cursor ? decodeCursor(cursorKeys, query.cursor) : null;
      const rows = await listUsers(tx, { limit: query.limit + 1, after, who: query.who });
      return ok(pageOf(rows, query.limit, (user) => [user.displayName, user.id]));
    },
  }),
  route({
    method: 'get',
    path: '/api/users/:id',
    summary: 'An account',
    access,
    audit: {
      action: 'user.read',
      objectType: 'user',
      objectId: ({ input }) => input.params.id,
    },
    request: { params: byId },
    response: { 200: userSchema },
    handler: async ({ tx, input }) => {
      const user = await findUser(tx, input.params.id);
      return user ? ok(user) : fail('not-found');
    },
  }),
  route({
    method: 'post',
    path: '/api/users',
    summary: 'Invites a member of staff',
    access,
    audit: {
      action: 'user.invited',
      objectType: 'user',
      objectId: ({ result }) => result.body.id,
      details: ({ input: { body } }) => ({ roles: body.roles, siteIds: body.siteIds }),
    },
    request: { body: newUserSchema },
    response: { 201: userSchema },
    constraints: { users_email_unique: 'email-taken' },
    handler: async ({ tx, context, actor, input }) =>
      created(await inviteUser(tx, context, actor, input.body)),
  }),
  route({
    method: 'patch',
    path: '/api/users/:id',
    summary: 'Changes an account’s roles, sites or marks, disables it or enables it again',
    access,
    audit: {
      action: 'user.changed',
      objectType: 'user',
      objectId: ({ input }) => input.params.id,
      details: ({ input: { body } }) => {
        const { displayName, ...rest } = body;
        return { ...rest, renamed: displayName !== undefined };
      },
    },
    request: { params: byId, body: userChangeSchema },
    response: { 200: userSchema },
    handler: async ({ tx, context, actor, input }) =>
      ok(await changeUser(tx, context, actor, { userId: input.params.id, change: input.body })),
  }),
  route({
    method: 'post',
    path: '/api/users/:id/invitation',
    summary: 'Sends an invitation again',
    access,
    audit: {
      action: 'user.invited',
      objectType: 'user',
      objectId: ({ input }) => input.params.id,
    },
    request: { params: byId },
    response: { 204: null },
    handler: async ({ tx, context, input }) => {
      await inviteAgain(tx, context, input.params.id);
      return noContent();
    },
  }),
  route({
    method: 'delete',
    path: '/api/users/:id/sessions',
    summary: 'Signs a person out everywhere',
    access,
    audit: {
      action: 'user.signed-out',
      objectType: 'user',
      objectId: ({ input }) => input.params.id,
    },
    request: { params: byId },
    response: { 204: null },
    handler: async ({ tx, input }) => {
      await endUserSessions(tx, input.params.id);
      return noContent();
    },
  }),
  route({
    method: 'post',
    path: '/api/patients/:id/invitation',
    summary: 'Invites a patient to an account of their own',
    access: { roles: ['front-desk', 'nurse', 'administrator'] },
    patient: ({ params }) => params.id,
    audit: {
      action: 'patient.invited',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: byId },
    response: { 204: null },
    constraints: { users_email_unique: 'email-taken' },
    handler: async ({ tx, context, actor, input }) => {
      await invitePatient(tx, context, actor, input.params.id);
      return noContent();
    },
  }),
];
