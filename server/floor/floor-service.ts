import type {
  AmendmentRequest,
  BeginRecordRequest,
  ReadingRequest,
} from '@shared/contracts/floor-contract';
import { requirePatientAccess } from '../accounts/access-service';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { fail, Failure } from '../http/failure';
import { doseMissed, floorRangeAt } from '../prescriptions/floor-ranges-queries';
import { proposeAfterSession } from '../progression/progression-service';
import { fulfilAppointment } from '../schedule/transition-service';
import { placementOf, sameReading, sameSet, statusOfEntry, type SentReading } from './floor-policy';
import {
  findReading,
  findRecord,
  findVisit,
  insertReading,
  insertRecord,
  lockRecord,
  markAmended,
  writeMissedDose,
  writeSignature,
  type ReadingRow,
  type RecordRow,
} from './floor-repository';

/** Who writes, and when the server received it. */
export interface FloorCall {
  readonly tx: Transaction;
  readonly actor: Actor;
  readonly now: Date;
}

/** What was written, and whether this call was the first to write it. */
export interface Written<T> {
  readonly first: boolean;
  readonly row: T;
}

function sameRecord(
  record: RecordRow,
  id: string,
  { appointmentId, startedAt, identityConfirmedWith }: BeginRecordRequest,
): boolean {
  return (
    record.id === id &&
    record.appointmentId === appointmentId &&
    record.startedAt.getTime() === new Date(startedAt).getTime() &&
    sameSet(record.identityConfirmedWith ?? [], identityConfirmedWith ?? [])
  );
}

/** The record that is there already: the same again is answered, and another tablet's is named so that its readings find it. */
function alreadyBegun(
  record: RecordRow,
  id: string,
  request: BeginRecordRequest,
): Written<string> | Failure {
  if (sameRecord(record, id, request)) return { first: false, row: record.id };
  const mine = record.appointmentId === request.appointmentId;
  return fail('already-recorded', {
    ...(mine && {
      title: 'The record of this visit was begun already.',
      more: { sessionRecordId: record.id },
    }),
  });
}

/**
 * Begins the record of a visit, with the range that was in force then.
 * @returns its id, or `not-found`, `not-checked-in`, `already-recorded`
 */
export async function beginRecord(
  { tx, actor, now }: FloorCall,
  id: string,
  request: BeginRecordRequest,
): Promise<(Written<string> & { readonly patientId: string }) | Failure> {
  const { appointmentId } = request;
  const visit = await findVisit(tx, appointmentId);
  if (!visit) return fail('not-found');
  const { patientId } = visit;
  await requirePatientAccess(tx, actor, patientId);
  const answer = (outcome: Written<string> | Failure) =>
    outcome instanceof Failure ? outcome : { ...outcome, patientId };
  const existing = await findRecord(tx, id, appointmentId);
  if (existing) return answer(alreadyBegun(existing, id, request));
  if (visit.status !== 'checked-in') return fail('not-checked-in');
  const startedAt = new Date(request.startedAt);
  const range = await floorRangeAt(tx, patientId, startedAt);
  const made = await insertRecord(tx, {
    id,
    appointmentId,
    patientId,
    startedAt,
    prescriptionId: range?.id ?? null,
    // The day's missed dose is kept with the day: it may be told later, or taken back.
    rangeWithdrawn: (range?.withdrawn ?? []).filter((reason) => reason !== doseMissed),
    identityConfirmedWith: request.identityConfirmedWith ?? null,
    recordedBy: actor.id,
    now,
  });
  if (made) return { first: true, row: id, patientId };
  const winner = await findRecord(tx, id, appointmentId);
  if (!winner) throw new Error('A session record was refused by one that is not there');
  return answer(alreadyBegun(winner, id, request));
}

/**
 * Says whether a patient came without the day's dose: effort leads that day alone, also in a record that is begun.
 * @returns whose visit it is, or `not-found`, `record-signed`
 */
export async function tellMissedDose(
  { tx, actor, now }: FloorCall,
  appointmentId: string,
  missed: boolean,
): Promise<{ readonly patientId: string } | Failure> {
  const visit = await findVisit(tx, appointmentId);
  if (!visit) return fail('not-found');
  const { patientId } = visit;
  await requirePatientAccess(tx, actor, patientId);
  if (visit.status === 'fulfilled') return fail('record-signed');
  await writeMissedDose(tx, { appointmentId, missed, recordedBy: actor.id, now });
  return { patientId };
}

type SentFields = Omit<ReadingRequest, 'sessionRecordId' | 'phase' | 'measuredAt'>;

const sent = (at: Pick<SentReading, 'phase' | 'measuredAt'>, fields: SentFields): SentReading => ({
  ...at,
  heartRate: fields.heartRate ?? null,
  systolic: fields.systolic ?? null,
  diastolic: fields.diastolic ?? null,
  oxygenSaturation: fields.oxygenSaturation ?? null,
  perceivedExertion: fields.perceivedExertion ?? null,
  symptoms: [...new Set(fields.symptoms ?? [])],
  note: fields.note || null,
});

/** The record, open to the caller, with no signature written while this transaction lasts. */
async function openRecord({ tx, actor }: FloorCall, id: string): Promise<RecordRow> {
  const record = await lockRecord(tx, id, 'share');
  if (!record) throw fail('not-found');
  await requirePatientAccess(tx, actor, record.patientId);
  return record;
}

const storedIn = ({ actor, now }: FloorCall, record: RecordRow, reading: SentReading) => ({
  ...reading,
  sessionRecordId: record.id,
  patientId: record.patientId,
  placement: placementOf(
    reading,
    record.prescriptionId === null ? null : { ...record, withdrawn: record.rangeWithdrawn },
  ),
  prescriptionId: record.prescriptionId,
  recordedBy: actor,
  now,
});

/** What stands under an id that is taken. */
function alreadyRead(
  existing: ReadingRow,
  wanted: SentReading & Pick<ReadingRow, 'sessionRecordId' | 'amends' | 'amendmentReason'>,
): Written<ReadingRow> | Failure {
  const same =
    existing.sessionRecordId === wanted.sessionRecordId &&
    existing.amends === wanted.amends &&
    existing.amendmentReason === wanted.amendmentReason &&
    sameReading(existing, wanted);
  return same ? { first: false, row: existing } : fail('already-recorded');
}

/**
 * Stores a reading and its place relative to the range that the record began with.
 * @returns the stored row, or `not-found`, `already-recorded`, `record-signed`, `not-checked-in`
 */
export async function recordReading(
  call: FloorCall,
  id: string,
  request: ReadingRequest,
): Promise<Written<ReadingRow> | Failure> {
  const record = await openRecord(call, request.sessionRecordId);
  const { phase, measuredAt } = request;
  const reading = sent({ phase, measuredAt: new Date(measuredAt) }, request);
  const original = { amends: null, amendmentReason: null };
  if (record.signedAt === null && record.appointmentStatus === 'checked-in') {
    const row = await insertReading(call.tx, {
      ...storedIn(call, record, reading),
      ...original,
      id,
      status: statusOfEntry(call.actor),
    });
    if (row) return { first: true, row };
  }
  const existing = await findReading(call.tx, id);
  if (existing) {
    return alreadyRead(existing, { ...reading, ...original, sessionRecordId: record.id });
  }
  return fail(record.signedAt === null ? 'not-checked-in' : 'record-signed');
}

/**
 * Corrects a reading by another that names it and says why; both stay. A signed record takes amendments too, though not
 * a student's.
 * @returns the stored row, or `not-found`, `forbidden`, `invalid-request`, `already-recorded`, `stale-version` (amended already)
 */
export async function amendReading(
  call: FloorCall,
  originalId: string,
  request: AmendmentRequest,
): Promise<Written<ReadingRow> | Failure> {
  const { tx, actor } = call;
  const original = await findReading(tx, originalId);
  if (!original) return fail('not-found');
  const record = await openRecord(call, original.sessionRecordId);
  if (request.sessionRecordId !== undefined && request.sessionRecordId !== record.id) {
    const message = 'An amendment stays in the record of its reading';
    const errors = [{ path: 'sessionRecordId', code: 'custom', message }];
    return fail('invalid-request', { errors });
  }
  const { id, reason, phase = original.phase, enteredInError = false } = request;
  const measuredAt = new Date(request.measuredAt ?? original.measuredAt);
  const reading = sent({ phase, measuredAt }, request);
  const amendment = { amends: originalId, amendmentReason: reason };
  const known = await findReading(tx, id);
  if (known) return alreadyRead(known, { ...reading, ...amendment, sessionRecordId: record.id });
  if (record.signedAt !== null && actor.student) return fail('forbidden');
  const row = await insertReading(tx, {
    ...storedIn(call, record, reading),
    ...amendment,
    id,
    status: enteredInError ? 'entered-in-error' : statusOfEntry(actor),
  });
  if (row) {
    await markAmended(tx, originalId);
    return { first: true, row };
  }
  const winner = await findReading(tx, id);
  return winner
    ? alreadyRead(winner, { ...reading, ...amendment, sessionRecordId: record.id })
    : fail('stale-version');
}

/**
 * Signs a record, marks its visit as done and works out the next step; signing again changes nothing.
 * @param exercised null: whether a reading at exercise is there
 * @returns whether this call signed, or `not-found`, `forbidden`, `not-checked-in`
 */
export async function signRecord(
  { tx, actor, now }: FloorCall,
  id: string,
  exercised: boolean | null,
): Promise<(Written<string> & { readonly patientId: string }) | Failure> {
  const record = await lockRecord(tx, id, 'sign');
  if (!record) return fail('not-found');
  const { patientId, appointmentId } = record;
  await requirePatientAccess(tx, actor, patientId);
  if (record.signedAt !== null) return { first: false, row: id, patientId };
  if (actor.student) {
    return fail('forbidden', {
      title: 'Ask who supervises you to sign: a student’s record waits for them.',
    });
  }
  const outcome = await writeSignature(tx, id, { userId: actor.id, now, exercised });
  const visit = await fulfilAppointment(tx, { actor, now }, appointmentId, outcome);
  if (visit instanceof Failure) return visit;
  await proposeAfterSession(tx, { recordId: id, patientId, now });
  return { first: true, row: id, patientId };
}
