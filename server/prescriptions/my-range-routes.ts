import * as z from 'zod';
import { myRangeSchema } from '@shared/contracts/my-range-contract';
import type { Transaction } from '../database/client';
import type { AppContext } from '../app-context';
import { ok } from '../http/answers';
import { fail } from '../http/failure';
import { fileAnswer, route, type RouteDefinition } from '../http/route';
import { chartRoles } from '../patients/patients-policy';
import { myRange } from './my-range-queries';
import { rangeSheet } from './range-sheet';

const toldOf = (tx: Transaction, patientId: string, { clock, settings }: AppContext) =>
  myRange(tx, patientId, { program: settings.programName, now: clock.now() });

/** The sheet for download; its name tells of nobody. */
async function sheetAnswer(tx: Transaction, patientId: string, context: AppContext) {
  const { range, ...sheet } = await toldOf(tx, patientId, context);
  if (!range)
    return fail('not-found', { title: 'No range is in force, so there is none to print.' });
  const headers = { 'Content-Disposition': 'attachment; filename="my-range.pdf"' };
  return { ...ok(await rangeSheet({ ...sheet, range }, context.clock.now())), headers };
}

const ownRecord = (action: string) => ({
  action,
  objectType: 'patient',
  objectId: ({ actor }: { actor: { patientId: string | null } | null }) => actor?.patientId ?? null,
  patientId: ({ actor }: { actor: { patientId: string | null } | null }) =>
    actor?.patientId ?? null,
});

const read = route({
  method: 'get',
  path: '/api/my/range',
  summary: 'What a patient is told of the own range',
  access: { roles: ['patient'] },
  audit: ownRecord('my-range.read'),
  request: {},
  response: { 200: myRangeSchema },
  handler: async ({ tx, actor, context }) =>
    actor.patientId === null ? fail('not-found') : ok(await toldOf(tx, actor.patientId, context)),
});

const ownSheet = route({
  method: 'get',
  path: '/api/my/range.pdf',
  summary: 'The own range in large print, on one page',
  access: { roles: ['patient'] },
  audit: ownRecord('my-range.printed'),
  request: {},
  response: { 200: fileAnswer('application/pdf') },
  handler: async ({ tx, actor, context }) =>
    actor.patientId === null ? fail('not-found') : sheetAnswer(tx, actor.patientId, context),
});

const sheetOfPatient = route({
  method: 'get',
  path: '/api/patients/:id/range.pdf',
  summary: 'A patient’s range as the patient is handed it: large print, one page',
  access: { roles: chartRoles },
  patient: ({ params }) => params.id,
  audit: {
    action: 'range.printed',
    objectType: 'patient',
    objectId: ({ input }) => input.params.id,
    patientId: ({ input }) => input.params.id,
  },
  request: { params: z.object({ id: z.uuid() }) },
  response: { 200: fileAnswer('application/pdf') },
  handler: async ({ tx, input, context }) => sheetAnswer(tx, input.params.id, context),
});

export const myRangeRoutes: RouteDefinition[] = [read, ownSheet, sheetOfPatient];
