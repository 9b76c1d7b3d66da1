import * as z from 'zod';
import {
  recordBatchRequestSchema,
  recordBatchResponseSchema,
  recordEntrySchema,
  recordKinds,
  recordResponseSchema,
  recordValues,
  stopMedicationRequestSchema,
  type NewRecordEntry,
  type RecordKind,
} from '@shared/contracts/record-contract';
import { created, ok } from '../http/answers';
import { route, type RouteDefinition } from '../http/route';
import { chartRoles } from './patients-policy';
import { patientRecord } from './record-queries';
import { recordRegistry } from './record-registry';
import { addEntries, enterInError, stopMedication } from './record-service';

const patientParams = z.object({ id: z.uuid() });
const entryParams = z.object({ id: z.uuid(), entryId: z.uuid() });
const ofPatient = { patient: ({ params }: { params: { id: string } }) => params.id };

/** What an entry says it takes the place of is not there to be replaced. */
const replacing = {
  constraints: {
    medications_replaces_medications_id_fk: 'stale-version',
    thresholds_supersedes_thresholds_id_fk: 'stale-version',
  },
} as const;

interface OfEntry {
  readonly input: { readonly params: { readonly id: string; readonly entryId: string } };
}

/** What happened to one entry, for the audit. */
const entryEvent = (action: string, kind: RecordKind) => ({
  action,
  objectType: kind,
  objectId: ({ input }: OfEntry) => input.params.entryId,
  patientId: ({ input }: OfEntry) => input.params.id,
});

/** The values of the contract; the sender may choose the entry's id, so that sending again enters nothing twice. */
function bodyOf<K extends RecordKind>(kind: K) {
  return recordValues[kind].safeExtend({ id: z.uuid().optional() });
}

function entryRoutes(kind: RecordKind): RouteDefinition[] {
  const writers = { roles: recordRegistry[kind].writers };
  return [
    route({
      method: 'post',
      path: `/api/patients/:id/record/${kind}`,
      summary: `Adds an entry to the record: ${kind.replaceAll('-', ' ')}`,
      access: writers,
      ...ofPatient,
      ...replacing,
      audit: {
        action: 'record.entered',
        objectType: kind,
        objectId: ({ result }) => result.body.id,
        patientId: ({ input }) => input.params.id,
      },
      request: { params: patientParams, body: bodyOf(kind) },
      response: { 201: recordEntrySchema },
      handler: async ({ tx, actor, input, context }) => {
        const { id, ...values } = input.body;
        const call = { tx, actor, patientId: input.params.id, now: context.clock.now() };
        const entry = { kind, id, values } as NewRecordEntry;
        const [added] = await addEntries(call, [entry], () => '');
        return created(added as NonNullable<typeof added>);
      },
    }),
    route({
      method: 'post',
      path: `/api/patients/:id/record/${kind}/:entryId/entered-in-error`,
      summary: `Marks an entry as entered in error; it stays to be read: ${kind.replaceAll('-', ' ')}`,
      access: writers,
      ...ofPatient,
      audit: entryEvent('record.entered-in-error', kind),
      request: { params: entryParams },
      response: { 200: recordEntrySchema },
      handler: async ({ tx, actor, input: { params }, context }) =>
        ok(
          await enterInError(
            { tx, actor, patientId: params.id, now: context.clock.now() },
            kind,
            params.entryId,
          ),
        ),
    }),
  ];
}

export const recordRoutes: RouteDefinition[] = [
  route({
    method: 'get',
    path: '/api/patients/:id/record',
    summary: 'The clinical record: all entries by kind, the newest first, those in error too',
    access: { roles: chartRoles },
    ...ofPatient,
    audit: {
      action: 'record.read',
      objectType: 'patient',
      objectId: ({ input }) => input.params.id,
      patientId: ({ input }) => input.params.id,
    },
    request: { params: patientParams },
    response: { 200: recordResponseSchema },
    handler: async ({ tx, input }) => ok(await patientRecord(tx, input.params.id)),
  }),
  route({
    method: 'post',
    path: '/api/patients/:id/record',
    summary: 'Adds several entries at once, all or none',
    access: { roles: chartRoles },
    ...ofPatient,
    ...replacing,
    audit: 'handler',
    request: { params: patientParams, body: recordBatchRequestSchema },
    response: { 201: recordBatchResponseSchema },
    handler: async ({ tx, actor, input, context, audit }) => {
      const patientId = input.params.id;
      const call = { tx, actor, patientId, now: context.clock.now() };
      const pathOf = (index: number) => `entries.${index}.values.`;
      const entries = await addEntries(call, input.body.entries, pathOf);
      entries.forEach(({ id }, index) => {
        const objectType = input.body.entries[index]?.kind ?? '';
        audit({ action: 'record.entered', objectType, objectId: id, patientId });
      });
      return created({ entries });
    },
  }),
  ...recordKinds.flatMap(entryRoutes),
  route({
    method: 'post',
    path: '/api/patients/:id/record/medications/:entryId/stop',
    summary: 'Stops a medication on a date; null takes the stop back',
    access: { roles: chartRoles },
    ...ofPatient,
    audit: entryEvent('medication.stopped', 'medications'),
    request: { params: entryParams, body: stopMedicationRequestSchema },
    response: { 200: recordEntrySchema },
    handler: async ({ tx, actor, input: { params, body }, context }) =>
      ok(
        await stopMedication(
          { tx, actor, patientId: params.id, now: context.clock.now() },
          params.entryId,
          body.stoppedOn,
        ),
      ),
  }),
];
