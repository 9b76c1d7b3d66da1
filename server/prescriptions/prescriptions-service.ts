import { evaluatePrescription } from '@shared/clinical/prescribing';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import type { Failure } from '../http/failure';
import { fail } from '../http/failure';
import { policyInForce } from './policy-queries';
import { findPrescription, type PrescriptionRow } from './prescriptions-queries';
import {
  endRanges,
  insertDraft,
  lockPrescription,
  openEnrollment,
  updateDraft,
  writePrescription,
} from './prescriptions-repository';

export interface Author {
  readonly actor: Actor;
  readonly now: Date;
}

/**
 * Works out a range by the policy in force, storing nothing.
 * @param client a transaction's connection, or the pool where there is no transaction
 * @param path where the request stands in the body, for the field error of a choice that does not apply
 * @throws Failure `not-applicable` with the reason
 */
export async function evaluate(
  client: Parameters<typeof policyInForce>[0],
  request: PrescriptionRequest,
  now: Date,
  path = '',
): Promise<PrescriptionAnswer> {
  const evaluation = evaluatePrescription(request, await policyInForce(client, now));
  if (evaluation.ok) return evaluation.answer;
  const { code, path: field, message } = evaluation.error;
  throw fail(code, { title: message, errors: [{ path: `${path}${field}`, code, message }] });
}

async function reread(tx: Transaction, id: string): Promise<PrescriptionRow> {
  const row = await findPrescription(tx, id);
  if (!row) throw new Error(`Prescription ${id} is gone`);
  return row;
}

/** Writes a draft for the patient's open course. */
export async function createDraft(
  tx: Transaction,
  { actor, now }: Author,
  patientId: string,
  inputs: PrescriptionRequest,
): Promise<PrescriptionRow | Failure> {
  const enrollment = await openEnrollment(tx, patientId);
  if (!enrollment) return fail('no-active-enrollment');
  const result = await evaluate(tx.connection, inputs, now, 'inputs.');
  const createdBy = actor.id;
  const draft = { patientId, enrollmentId: enrollment.id, createdBy, createdAt: now };
  return reread(tx, await insertDraft(tx, { ...draft, inputs, result }));
}

/** Changes a draft that nobody has signed. */
export async function changeDraft(
  tx: Transaction,
  { now }: Author,
  id: string,
  change: { readonly inputs: PrescriptionRequest; readonly version: number },
): Promise<PrescriptionRow | Failure> {
  const found = await lockPrescription(tx, id);
  if (!found) return fail('not-found');
  if (found.row.signedAt !== null) return fail('already-signed');
  if (found.row.version !== change.version) return fail('stale-version');
  if (found.row.status !== 'draft') return fail('illegal-transition');
  const result = await evaluate(tx.connection, change.inputs, now, 'inputs.');
  await updateDraft(tx, id, { inputs: change.inputs, result, changedAt: now });
  return reread(tx, id);
}

/** Puts a draft aside for good; what is or was in force is superseded instead. */
export async function revokeDraft(
  tx: Transaction,
  { now }: Author,
  id: string,
  version: number,
): Promise<PrescriptionRow | Failure> {
  const found = await lockPrescription(tx, id);
  if (!found) return fail('not-found');
  if (found.row.status !== 'draft') return fail('illegal-transition');
  if (found.row.version !== version) return fail('stale-version');
  await writePrescription(tx, id, { status: 'revoked', awaiting: null, endedAt: now });
  return reread(tx, id);
}

/** Ends what is in force, and puts aside what is written, when a course ends; inside the transaction that ends it. */
export const endRangesOfCourse = endRanges;
