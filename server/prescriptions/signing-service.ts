import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { Transaction } from '../database/client';
import { fail, Failure } from '../http/failure';
import { policyInForce } from './policy-queries';
import { isPhysician, physicianCauses } from './prescriptions-policy';
import { findPrescription, type PrescriptionRow } from './prescriptions-queries';
import { hadRange, lockPrescription, writePrescription } from './prescriptions-repository';
import type { Author } from './prescriptions-service';

type Locked = NonNullable<Awaited<ReturnType<typeof lockPrescription>>>;

/** What one signature changes. */
interface Signature {
  readonly change: Parameters<typeof writePrescription>[2];
  readonly entersIntoForce: boolean;
}

async function staffSignature(
  tx: Transaction,
  { actor, now }: Author,
  { row, active }: Locked,
): Promise<Signature> {
  const signed = { signedAt: now, signedBy: actor.id, supersedes: active?.id ?? null };
  if (isPhysician(actor)) {
    const physician = { physicianSignedAt: now, physicianSignedBy: actor.id };
    return { change: { ...signed, ...physician }, entersIntoForce: true };
  }
  const causes = physicianCauses(
    {
      inputs: row.inputs as PrescriptionRequest,
      result: row.result as PrescriptionAnswer,
      first: !(await hadRange(tx, row.enrollmentId)),
      student: actor.student,
    },
    await policyInForce(tx, now),
  );
  if (causes.length === 0) return { change: signed, entersIntoForce: true };
  return { change: { ...signed, awaiting: 'physician' }, entersIntoForce: false };
}

function physicianSignature({ actor, now }: Author, { row, active }: Locked): Signature | Failure {
  if ((active?.id ?? null) !== row.supersedes) {
    return fail('stale-version', {
      title:
        'Another range entered into force since this was signed. Put it aside and write it anew.',
    });
  }
  const change = { physicianSignedAt: now, physicianSignedBy: actor.id };
  return { change, entersIntoForce: true };
}

function refusalOf({ row }: Locked, { actor }: Author, version: number): Failure | null {
  const lacksPhysician = row.signedAt !== null && row.awaiting === 'physician';
  if (row.status === 'revoked' || row.status === 'entered-in-error')
    return fail('illegal-transition');
  if (row.status !== 'draft' || (lacksPhysician && !isPhysician(actor)))
    return fail('already-signed');
  return row.version === version ? null : fail('stale-version');
}

/**
 * Adds a signature. The range enters into force with the last one it needs, and the one before it ends then.
 * @param version as the signer has seen it
 * @returns the prescription, active or still a draft awaiting a physician; `already-signed` when this person has nothing
 * left to sign, `stale-version` when it changed, or another range entered into force, since it was seen
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
  const signature =
    locked.row.signedAt === null
      ? await staffSignature(tx, author, locked)
      : physicianSignature(author, locked);
  if (signature instanceof Failure) return signature;
  await enter(tx, author, locked, signature);
  const signed = await findPrescription(tx, id);
  return signed ?? fail('not-found');
}

/** Writes the signature; the former range ends before the new one begins, as one is in force at a time. */
async function enter(
  tx: Transaction,
  { now }: Author,
  { row, active }: Locked,
  { change, entersIntoForce }: Signature,
): Promise<void> {
  if (!entersIntoForce) return writePrescription(tx, row.id, change);
  if (active) await writePrescription(tx, active.id, { status: 'completed', endedAt: now });
  const inForce = { status: 'active', awaiting: null, activatedAt: now } as const;
  return writePrescription(tx, row.id, { ...change, ...inForce });
}
