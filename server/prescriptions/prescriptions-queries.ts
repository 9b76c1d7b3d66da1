import { desc, eq, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import type { Queryable } from '../database/client';
import { prescriptions, users } from '../database/schema';

const author = alias(users, 'author');
const signer = alias(users, 'signer');
const physician = alias(users, 'physician');

/** A prescription with those who made and signed it; `inputs` and `result` are as they were stored. */
export type PrescriptionRow = Awaited<ReturnType<typeof selectPrescriptions>>[number];

function selectPrescriptions(tx: Queryable) {
  return tx
    .select({
      id: prescriptions.id,
      patientId: prescriptions.patientId,
      enrollmentId: prescriptions.enrollmentId,
      status: prescriptions.status,
      version: prescriptions.version,
      inputs: sql<PrescriptionRequestInput>`${prescriptions.inputs}`,
      result: sql<PrescriptionAnswer>`${prescriptions.result}`,
      policyVersion: prescriptions.policyVersion,
      engineVersion: prescriptions.engineVersion,
      supersedes: prescriptions.supersedes,
      awaiting: prescriptions.awaiting,
      createdAt: prescriptions.createdAt,
      changedAt: prescriptions.changedAt,
      createdBy: { id: author.id, displayName: author.displayName },
      signedAt: prescriptions.signedAt,
      signedBy: { id: signer.id, displayName: signer.displayName },
      physicianSignedAt: prescriptions.physicianSignedAt,
      physicianSignedBy: { id: physician.id, displayName: physician.displayName },
      activatedAt: prescriptions.activatedAt,
      endedAt: prescriptions.endedAt,
    })
    .from(prescriptions)
    .innerJoin(author, eq(author.id, prescriptions.createdBy))
    .leftJoin(signer, eq(signer.id, prescriptions.signedBy))
    .leftJoin(physician, eq(physician.id, prescriptions.physicianSignedBy))
    .$dynamic();
}

/** @returns undefined when there is none */
export async function findPrescription(
  tx: Queryable,
  id: string,
): Promise<PrescriptionRow | undefined> {
  const [row] = await selectPrescriptions(tx).where(eq(prescriptions.id, id));
  return row;
}

/** A patient's prescriptions, newest first. */
export const listPrescriptions = (tx: Queryable, patientId: string): Promise<PrescriptionRow[]> =>
  selectPrescriptions(tx)
    .where(eq(prescriptions.patientId, patientId))
    .orderBy(desc(prescriptions.createdAt), desc(prescriptions.id));
