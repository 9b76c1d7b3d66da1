import { and, eq, sql } from 'drizzle-orm';
import type { Transaction } from '../database/client';
import { enrollments, patients } from '../database/schema';

type NewPatient = typeof patients.$inferInsert;
type NewEnrollment = typeof enrollments.$inferInsert;

/** @returns undefined when the record number is taken */
export async function insertPatient(tx: Transaction, given: NewPatient) {
  const [made] = await tx
    .insert(patients)
    .values(given)
    .onConflictDoNothing({ target: patients.recordNumber })
    .returning({ id: patients.id });
  return made?.id;
}

/**
 * @returns whether the version was still the one that the change was made against
 * @throws on constraint `patients_recordNumber_unique`
 */
export async function updatePatient(
  tx: Transaction,
  patientId: string,
  version: number,
  change: Partial<NewPatient>,
): Promise<boolean> {
  const changed = await tx
    .update(patients)
    .set({ ...change, version: sql`${patients.version} + 1` })
    .where(and(eq(patients.id, patientId), eq(patients.version, version)))
    .returning({ id: patients.id });
  return changed.length === 1;
}

/** @throws on constraint `enrollments_one_active` */
export async function insertEnrollment(tx: Transaction, given: NewEnrollment): Promise<string> {
  const [made] = await tx.insert(enrollments).values(given).returning({ id: enrollments.id });
  if (!made) throw new Error('An enrollment was not made');
  return made.id;
}

/** The row of a patient's course, locked until the transaction ends; undefined when it is not theirs. */
export async function lockEnrollment(tx: Transaction, patientId: string, enrollmentId: string) {
  const [row] = await tx
    .select()
    .from(enrollments)
    .where(and(eq(enrollments.id, enrollmentId), eq(enrollments.patientId, patientId)))
    .for('update');
  return row;
}

export async function updateEnrollment(
  tx: Transaction,
  enrollmentId: string,
  change: Partial<NewEnrollment>,
): Promise<void> {
  await tx
    .update(enrollments)
    .set({ ...change, version: sql`${enrollments.version} + 1` })
    .where(eq(enrollments.id, enrollmentId));
}
