import { engineVersion } from '@shared/clinical/prescribing';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import { physicianCausesOf } from '@shared/clinical/plan-limits';
import type { Transaction } from '../database/client';
import { fail, Failure } from '../http/failure';
import { policyInForce } from './policy-queries';
import { hasNothingToSign, signsAsPhysician } from './prescriptions-policy';
import { findPrescription, type PrescriptionRow } from './prescriptions-queries';
import {
  courseOf,
  lockPrescription,
  writePrescription,
  type Locked,
} from './prescriptions-repository';
import type { Author } from './prescriptions-service';

/** What one signature changes. */
interface Signature {
  readonly change: Parameters<typeof writePrescription>[2];
  readonly entersIntoForce: boolean;
}

const outdated = (): Failure =>
  fail('stale-version', {
    title:
      'The rules have changed since this draft was worked out. Open it, look at the new numbers and keep it again.',
  });

const overtaken = (): Failure =>
  fail('stale-version', {
    title:
      'Another range entered into force since this was signed. Put it aside and write it anew.',
  });

async function firstSignature(
  tx: Transaction,
  { actor, now }: Author,
  { row, active }: Locked,
): Promise<Signature | Failure> {
  const policy = await policyInForce(tx.connection, now);
  if (row.policyVersion !== policy.version || row.engineVersion !== engineVersion) {
    return outdated();
  }
  const course = await courseOf(tx, row.enrollmentId);
  if (!course.open) return fail('no-active-enrollment');
  const signed = { signedAt: now, signedBy: actor.id, supersedes: active?.id ?? null };
  if (signsAsPhysician(actor)) {
    const physician = { physicianSignedAt: now, physicianSignedBy: actor.id };
    return { change: { ...signed, ...physician }, entersIntoForce: true };
  }
  const proposal = {
    inputs: row.inputs as PrescriptionRequest,
    result: row.result as PrescriptionAnswer,
    first: !course.hadRange,
    student: actor.student,
  };
  const causes = physicianCausesOf(proposal, policy);
  if (causes.length === 0) return { change: signed, entersIntoForce: true };
  return { change: { ...signed, awaiting: 'physician' }, entersIntoForce: false };
}

/** What was signed cannot change any more, so neither may what it takes the place of. */
async function physicianSignature(
  tx: Transaction,
  { actor, now }: Author,
  { row, active }: Locked,
): Promise<Signature | Failure> {
  if ((active?.id ?? null) !== row.supersedes) return overtaken();
  if (!(await courseOf(tx, row.enrollmentId)).open) return fail('no-active-enrollment');
  const change = { physicianSignedAt: now, physicianSignedBy: actor.id };
  return { change, entersIntoForce: true };
}

function refusalOf({ row }: Locked, { actor }: Author, version: number): Failure | null {
  if (hasNothingToSign(row, actor)) return fail('already-signed');
  if (row.status !== 'draft') return fail('illegal-transition');
  return row.version === version ? null : fail('stale-version');
}

/**
 * Adds a signature. The range enters into force with the last one it needs, and the one before it ends then; what still
 * waited for a physician is put aside, since it was signed to follow another range.
 * @param version as the signer has seen it
 * @returns the prescription, active or still a draft awaiting a physician; `already-signed` when this person has nothing
 * left to sign, `stale-version` when it, the rules or the range in force changed since it was seen,
 * `no-active-enrollment` when its course is over, `illegal-transition` when it was put aside
 */
export async function signPrescription(
  tx: Transaction,
  author: Author,
  id: string,
  version: number,
): Promise<PrescriptionRow | Failure> {
  const locked = await lockPrescription(tx, id);
  if (!locked) return fail('not-found');
  const refusal = refusalOf(locked, author, version);
  if (refusal) return refusal;
  const sign = locked.row.signedAt === null ? firstSignature : physicianSignature;
  const signature = await sign(tx, author, locked);
  if (signature instanceof Failure) return signature;
  await enter(tx, author, locked, signature);
  const signed = await findPrescription(tx, id);
  return signed ?? fail('not-found');
}

/** Writes the signature; the former range ends before the new one begins, as one is in force at a time. */
async function enter(
  tx: Transaction,
  { now }: Author,
  { row, active, waiting }: Locked,
  { change, entersIntoForce }: Signature,
): Promise<void> {
  if (!entersIntoForce) return writePrescription(tx, row.id, change);
  if (active) await writePrescription(tx, active.id, { status: 'completed', endedAt: now });
  for (const { id } of waiting) {
    await writePrescription(tx, id, { status: 'revoked', awaiting: null, endedAt: now });
  }
  const inForce = { status: 'active', awaiting: null, activatedAt: now } as const;
  return writePrescription(tx, row.id, { ...change, ...inForce });
}
