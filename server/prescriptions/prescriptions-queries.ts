import { and, desc, eq, inArray, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';
import type { Queryable } from '../database/client';
import { prescriptions, users } from '../database/schema';

const author = alias(users, 'author');
const signer = alias(users, 'signer');
const physician = alias(users, 'physician');

/** A person who wrote or signed, as pages name them. */
export interface Signatory {
  readonly id: string;
  readonly displayName: string;
}

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

/** What floor and pages need of a range in force. */
export interface RangeInForce {
  readonly patientId: string;
  readonly prescriptionId: string;
  readonly inputs: PrescriptionRequest;
  readonly result: PrescriptionAnswer;
  readonly activatedAt: Date;
}

/** The ranges in force of any number of patients, by patient, in one statement. */
export async function rangesInForce(
  tx: Queryable,
  patientIds: readonly string[],
): Promise<ReadonlyMap<string, RangeInForce>> {
  if (patientIds.length === 0) return new Map();
  const rows = await tx
    .select({
      patientId: prescriptions.patientId,
      prescriptionId: prescriptions.id,
      inputs: sql<PrescriptionRequest>`${prescriptions.inputs}`,
      result: sql<PrescriptionAnswer>`${prescriptions.result}`,
      activatedAt: sql<Date>`${prescriptions.activatedAt}`.mapWith(prescriptions.activatedAt),
    })
    .from(prescriptions)
    .where(
      and(eq(prescriptions.status, 'active'), inArray(prescriptions.patientId, [...patientIds])),
    );
  return new Map(rows.map((row) => [row.patientId, row]));
}

/** @returns undefined while no range is in force */
export async function rangeInForce(
  tx: Queryable,
  patientId: string,
): Promise<RangeInForce | undefined> {
  return (await rangesInForce(tx, [patientId])).get(patientId);
}
