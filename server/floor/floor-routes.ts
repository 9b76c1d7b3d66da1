import * as z from 'zod';
import {
  amendmentRequestSchema,
  beginRecordRequestSchema,
  missedDoseSchema,
  readingRequestSchema,
  readingSchema,
  rosterResponseSchema,
  rosterStampSchema,
  sessionRecordSchema,
  signRecordRequestSchema,
  type SessionRecord,
} from '@shared/contracts/floor-contract';
import { boutRequestSchema, boutSchema } from '@shared/contracts/progression-contract';
import { requirePatientAccess } from '../accounts/access-service';
import { created, noContent, ok } from '../http/answers';
import { fail, Failure } from '../http/failure';
import { route, type Call, type RouteDefinition } from '../http/route';
import { findClassDate } from '../schedule/class-dates-queries';
import { presentBout, recordBout } from './bouts-service';
import { floorReaders, floorWriters } from './floor-policy';
import { classRoster, presentReading, rosterStamp, sessionRecord } from './floor-queries';
import type { ReadingRow } from './floor-repository';
import {
  amendReading,
  beginRecord,
  recordReading,
  signRecord,
  tellMissedDose,
  type FloorCall,
  type Written,
} from './floor-service';

const idParams = z.object({ id: z.uuid() });

/** A client makes its ids as UUIDv7, so that they sort by time; any UUID is taken. */
const writers = { roles: floorWriters };
const readers = { roles: floorReaders };

type AnyCall = Pick<
  Call<object, { readonly roles: typeof floorWriters }, 'one'>,
  'tx' | 'actor' | 'context' | 'audit'
>;

const floorCall = ({ tx, actor, context }: AnyCall): FloorCall => ({
  tx,
  actor,
  now: context.clock.now(),
});

const roster = route({
  method: 'get',
  path: '/api/class-dates/:id/roster',
  summary: 'Who is in a class, with each one’s range and the readings of this visit',
  access: readers,
  audit: {
    action: 'roster.read',
    objectType: 'class-date',
    objectId: ({ input }) => input.params.id,
    patientId: ({ result }) => result.body.items.map(({ patientId }) => patientId),
  },
  keepsSessionAlive: false,
  request: { params: idParams },
  response: { 200: rosterResponseSchema },
  handler: async ({ tx, actor, input, context }) => {
    const now = context.clock.now();
    const { items, notShown } = await classRoster(tx, input.params.id, actor.siteIds, now);
    if (items.length === 0) {
      const classDate = await findClassDate(tx, input.params.id);
      if (!classDate || !actor.siteIds.includes(classDate.siteId)) return fail('not-found');
    }
    return ok({ items, notShown, at: now.toISOString() });
  },
});

const stamp = route({
  method: 'get',
  path: '/api/class-dates/:id/roster/stamp',
  summary: 'Whether a roster has changed; tells of nobody',
  access: readers,
  audit: 'none',
  keepsSessionAlive: false,
  request: { params: idParams },
  response: { 200: rosterStampSchema },
  handler: async ({ tx, input }) => ok({ stamp: await rosterStamp(tx, input.params.id) }),
});

/** @throws Failure `not-found` */
async function recordOf({ tx }: Pick<AnyCall, 'tx'>, id: string): Promise<SessionRecord> {
  const record = await sessionRecord(tx, id);
  if (!record) throw fail('not-found');
  return record;
}

const read = route({
  method: 'get',
  path: '/api/session-records/:id',
  summary: 'The record of a visit with all its readings',
  access: readers,
  audit: {
    action: 'session-record.read',
    objectType: 'session-record',
    objectId: ({ input }) => input.params.id,
    patientId: ({ result }) => result.body.patientId,
  },
  request: { params: idParams },
  response: { 200: sessionRecordSchema },
  handler: async ({ tx, actor, input }) => {
    const record = await recordOf({ tx }, input.params.id);
    await requirePatientAccess(tx, actor, record.patientId);
    return ok(record);
  },
});

const begin = route({
  method: 'put',
  path: '/api/session-records/:id',
  summary: 'Begins the record of a visit; the same again answers the same',
  access: writers,
  audit: 'handler',
  request: { params: idParams, body: beginRecordRequestSchema },
  response: { 200: sessionRecordSchema, 201: sessionRecordSchema },
  handler: async (call) => {
    const { id } = call.input.params;
    const outcome = await beginRecord(floorCall(call), id, call.input.body);
    if (outcome instanceof Failure) return outcome;
    const { first, patientId } = outcome;
    const action = first ? 'session-record.begun' : 'session-record.sent-again';
    call.audit({ action, objectType: 'session-record', objectId: id, patientId });
    const record = await recordOf(call, id);
    return first ? created(record) : ok(record);
  },
});

/** What came of a reading, told to the audit and the sender. */
function readingAnswer(call: AnyCall, outcome: Written<ReadingRow> | Failure, first: string) {
  if (outcome instanceof Failure) return outcome;
  const { id, patientId } = outcome.row;
  const action = outcome.first ? first : 'vital-signs.sent-again';
  call.audit({ action, objectType: 'vital-signs', objectId: id, patientId });
  const reading = presentReading(outcome.row);
  return outcome.first ? created(reading) : ok(reading);
}

const recordVitals = route({
  method: 'put',
  path: '/api/vital-signs/:id',
  summary: 'Stores a reading and answers where it lies; the same again answers the same',
  access: writers,
  audit: 'handler',
  constraints: { vital_signs_record_open: 'record-signed' },
  request: { params: idParams, body: readingRequestSchema },
  response: { 200: readingSchema, 201: readingSchema },
  handler: async (call) => {
    const { params, body } = call.input;
    const outcome = await recordReading(floorCall(call), params.id, body);
    return readingAnswer(call, outcome, 'vital-signs.recorded');
  },
});

const recordWork = route({
  method: 'put',
  path: '/api/exercise-bouts/:id',
  summary: 'Stores how a machine was set during a visit; the same again answers the same',
  access: writers,
  audit: 'handler',
  request: { params: idParams, body: boutRequestSchema },
  response: { 200: boutSchema, 201: boutSchema },
  handler: async (call) => {
    const { params, body } = call.input;
    const outcome = await recordBout(floorCall(call), params.id, body);
    if (outcome instanceof Failure) return outcome;
    const { first, row } = outcome;
    const action = first ? 'exercise-bout.recorded' : 'exercise-bout.sent-again';
    const { id, patientId } = row;
    call.audit({ action, objectType: 'exercise-bout', objectId: id, patientId });
    return first ? created(presentBout(row)) : ok(presentBout(row));
  },
});

const amend = route({
  method: 'post',
  path: '/api/vital-signs/:id/amendments',
  summary: 'Corrects a reading by another with its reason; both stay',
  access: writers,
  audit: 'handler',
  request: { params: idParams, body: amendmentRequestSchema },
  response: { 200: readingSchema, 201: readingSchema },
  handler: async (call) => {
    const { params, body } = call.input;
    const outcome = await amendReading(floorCall(call), params.id, body);
    return readingAnswer(call, outcome, 'vital-signs.amended');
  },
});

const missedDose = route({
  method: 'put',
  path: '/api/appointments/:id/missed-dose',
  summary: 'Says whether a patient came without the day’s dose: effort leads that day alone',
  access: writers,
  audit: 'handler',
  request: { params: idParams, body: missedDoseSchema },
  response: { 204: null },
  handler: async (call) => {
    const { id } = call.input.params;
    const { missed } = call.input.body;
    const outcome = await tellMissedDose(floorCall(call), id, missed);
    if (outcome instanceof Failure) return outcome;
    const action = missed ? 'missed-dose.told' : 'missed-dose.taken-back';
    call.audit({ action, objectType: 'appointment', objectId: id, patientId: outcome.patientId });
    return noContent();
  },
});

const sign = route({
  method: 'post',
  path: '/api/session-records/:id/sign',
  summary: 'Signs a record and marks the visit as done; again answers the first signature',
  access: writers,
  audit: 'handler',
  request: { params: idParams, body: signRecordRequestSchema },
  response: { 200: sessionRecordSchema },
  handler: async (call) => {
    const { id } = call.input.params;
    const outcome = await signRecord(floorCall(call), id, call.input.body?.exercised ?? null);
    if (outcome instanceof Failure) return outcome;
    const { first, patientId } = outcome;
    const action = first ? 'session-record.signed' : 'session-record.read';
    call.audit({ action, objectType: 'session-record', objectId: id, patientId });
    return ok(await recordOf(call, id));
  },
});

export const floorRoutes: RouteDefinition[] = [
  roster,
  stamp,
  read,
  begin,
  recordVitals,
  recordWork,
  amend,
  missedDose,
  sign,
];
