import { and, desc, eq, inArray, isNotNull, sql } from 'drizzle-orm';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { Transaction } from '../database/client';
import { enrollments, prescriptions } from '../database/schema';

/** What is worked out and stored together: the same inputs, policy and engine give the same answer again. */
export interface Computed {
  readonly inputs: PrescriptionRequest;
  readonly result: PrescriptionAnswer;
}

const stored = ({ inputs, result }: Computed) => ({
  inputs,
  result,
  policyVersion: result.policyVersion,
  engineVersion: result.engineVersion,
});

/** The course that a new range belongs to; undefined when none is active or on hold. */
export async function openEnrollment(tx: Transaction, patientId: string) {
  const [found] = await tx
    .select({ id: enrollments.id })
    .from(enrollments)
    .where(
      and(eq(enrollments.patientId, patientId), inArray(enrollments.status, ['active', 'on-hold'])),
    )
    .orderBy(desc(enrollments.enrolledOn))
    .limit(1);
  return found;
}

export async function insertDraft(
  tx: Transaction,
  draft: Computed & {
    readonly patientId: string;
    readonly enrollmentId: string;
    readonly createdBy: string;
    readonly createdAt: Date;
  },
): Promise<string> {
  const { patientId, enrollmentId, createdBy, createdAt } = draft;
  const [row] = await tx
    .insert(prescriptions)
    .values({ patientId, enrollmentId, createdBy, createdAt, ...stored(draft) })
    .returning({ id: prescriptions.id });
  if (!row) throw new Error('The draft was not inserted');
  return row.id;
}

export async function updateDraft(
  tx: Transaction,
  id: string,
  draft: Computed & { readonly changedAt: Date },
): Promise<void> {
  const { changedAt } = draft;
  await tx
    .update(prescriptions)
    .set({ ...stored(draft), changedAt, version: sql`${prescriptions.version} + 1` })
    .where(eq(prescriptions.id, id));
}

/** Locks every prescription of a patient, so that two signatures queue: undefined when there is no such one. */
export async function lockPrescription(tx: Transaction, id: string) {
  const ofSamePatient = tx
    .select({ patientId: prescriptions.patientId })
    .from(prescriptions)
    .where(eq(prescriptions.id, id));
  const rows = await tx
    .select()
    .from(prescriptions)
    .where(inArray(prescriptions.patientId, ofSamePatient))
    .orderBy(prescriptions.id)
    .for('no key update');
  const row = rows.find((each) => each.id === id);
  return row && { row, active: rows.find(({ status }) => status === 'active') };
}

/** Whether a range was ever in force in the course. */
export async function hadRange(tx: Transaction, enrollmentId: string): Promise<boolean> {
  const rows = await tx
    .select({ id: prescriptions.id })
    .from(prescriptions)
    .where(and(eq(prescriptions.enrollmentId, enrollmentId), isNotNull(prescriptions.activatedAt)))
    .limit(1);
  return rows.length > 0;
}

type Change = Partial<typeof prescriptions.$inferInsert>;

/** Writes signatures and the ends of a life; a trigger refuses everything else once it is signed. */
export async function writePrescription(tx: Transaction, id: string, change: Change) {
  await tx
    .update(prescriptions)
    .set({ ...change, version: sql`${prescriptions.version} + 1` })
    .where(eq(prescriptions.id, id));
}
