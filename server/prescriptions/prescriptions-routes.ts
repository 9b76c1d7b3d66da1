import * as z from 'zod';
import {
  prescriptionAnswerSchema,
  prescriptionRequestSchema,
} from '@shared/contracts/prescriptions-contract';
import {
  changeDraftRequestSchema,
  draftRequestSchema,
  prescriptionListSchema,
  prescriptionSchema,
  versionRequestSchema,
  type Prescription,
} from '@shared/contracts/prescription-record-contract';
import { requirePatientAccess } from '../accounts/access-service';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { created, ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type RouteDefinition } from '../http/route';
import { prescribingRoles, signingRoles } from './prescriptions-policy';
import { presentPrescription } from './present-prescription';
import { findPrescription, listPrescriptions } from './prescriptions-queries';
import { changeDraft, createDraft, evaluate, revokeDraft } from './prescriptions-service';
import { signPrescription } from './signing-service';
import { waitingRoutes } from './waiting-routes';

const idParams = z.object({ id: z.uuid() });

/** @throws Failure `not-found` when there is no such prescription, or the caller may not know of it */
async function openPrescription(tx: Transaction, actor: Actor, id: string) {
  const row = await findPrescription(tx, id);
  if (!row) throw fail('not-found');
  await requirePatientAccess(tx, actor, row.patientId);
  return row;
}

const audited = (action: string) => ({
  action,
  details: ({ result }: { result: { body: Pick<Prescription, 'status' | 'version'> } }) => ({
    status: result.body.status,
    version: result.body.version,
  }),
  objectType: 'prescription',
  objectId: ({ result }: { result: { body: Pick<Prescription, 'id'> } }) => result.body.id,
  patientId: ({ result }: { result: { body: Pick<Prescription, 'patientId'> } }) =>
    result.body.patientId,
});

const evaluateRoute = route({
  method: 'post',
  path: '/api/prescriptions/evaluate',
  summary: 'Works out a range by the policy in force; stores nothing',
  access: { roles: prescribingRoles },
  audit: 'none',
  transaction: 'none',
  request: { body: prescriptionRequestSchema },
  response: { 200: prescriptionAnswerSchema },
  handler: async ({ input, context: { database, clock } }) =>
    ok(await evaluate(database.$client, input.body, clock.now())),
});

const list = route({
  method: 'get',
  path: '/api/patients/:id/prescriptions',
  summary: 'A patient’s prescriptions, newest first',
  access: { roles: prescribingRoles },
  patient: ({ params }) => params.id,
  audit: {
    action: 'prescriptions.read',
    objectType: 'patient',
    objectId: ({ input }) => input.params.id,
    patientId: ({ input }) => input.params.id,
  },
  request: { params: idParams },
  response: { 200: prescriptionListSchema },
  handler: async ({ tx, input }) => {
    const rows = await listPrescriptions(tx, input.params.id);
    return ok({ items: rows.map(presentPrescription), nextCursor: null });
  },
});

const create = route({
  method: 'post',
  path: '/api/patients/:id/prescriptions',
  summary: 'Writes a draft; the server works out its numbers',
  access: { roles: prescribingRoles },
  patient: ({ params }) => params.id,
  audit: audited('prescription.drafted'),
  request: { params: idParams, body: draftRequestSchema },
  response: { 201: prescriptionSchema },
  handler: async ({ tx, actor, input, context }) => {
    const author = { actor, now: context.clock.now() };
    const row = await createDraft(tx, author, input.params.id, input.body.inputs);
    return row instanceof Failure ? row : created(presentPrescription(row));
  },
});

const read = route({
  method: 'get',
  path: '/api/prescriptions/:id',
  summary: 'One prescription with all that its numbers rest on',
  access: { roles: prescribingRoles },
  audit: audited('prescription.read'),
  request: { params: idParams },
  response: { 200: prescriptionSchema },
  handler: async ({ tx, actor, input }) =>
    ok(presentPrescription(await openPrescription(tx, actor, input.params.id))),
});

const change = route({
  method: 'put',
  path: '/api/prescriptions/:id',
  summary: 'Changes a draft that nobody has signed',
  access: { roles: prescribingRoles },
  audit: audited('prescription.changed'),
  request: { params: idParams, body: changeDraftRequestSchema },
  response: { 200: prescriptionSchema },
  handler: async ({ tx, actor, input, context }) => {
    await openPrescription(tx, actor, input.params.id);
    const author = { actor, now: context.clock.now() };
    const row = await changeDraft(tx, author, input.params.id, input.body);
    return row instanceof Failure ? row : ok(presentPrescription(row));
  },
});

const sign = route({
  method: 'post',
  path: '/api/prescriptions/:id/sign',
  summary: 'Signs; the range enters into force with the last signature that it needs',
  access: { roles: signingRoles },
  audit: audited('prescription.signed'),
  request: { params: idParams, body: versionRequestSchema },
  response: { 200: prescriptionSchema },
  constraints: { prescriptions_one_active: 'stale-version' },
  handler: async ({ tx, actor, input, context }) => {
    await openPrescription(tx, actor, input.params.id);
    const author = { actor, now: context.clock.now() };
    const row = await signPrescription(tx, author, input.params.id, input.body.version);
    return row instanceof Failure ? row : ok(presentPrescription(row));
  },
});

const revoke = route({
  method: 'post',
  path: '/api/prescriptions/:id/revoke',
  summary: 'Puts a draft aside for good',
  access: { roles: signingRoles },
  audit: audited('prescription.revoked'),
  request: { params: idParams, body: versionRequestSchema },
  response: { 200: prescriptionSchema },
  handler: async ({ tx, actor, input, context }) => {
    await openPrescription(tx, actor, input.params.id);
    const author = { actor, now: context.clock.now() };
    const row = await revokeDraft(tx, author, input.params.id, input.body.version);
    return row instanceof Failure ? row : ok(presentPrescription(row));
  },
});

export const prescriptionsRoutes: RouteDefinition[] = [
  evaluateRoute,
  list,
  create,
  read,
  change,
  sign,
  revoke,
  ...waitingRoutes,
];
