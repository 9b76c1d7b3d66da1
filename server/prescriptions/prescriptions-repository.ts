import { and, desc, eq, inArray, or, sql } from 'drizzle-orm';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { Queryable, Transaction } from '../database/client';
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

/**
 * Locks the patient, so that signatures and changes of one patient's ranges queue, then reads.
 * @returns the prescription with the patient's others that are not over, undefined when there is no such one
 */
export async function lockPrescription(tx: Transaction, id: string) {
  await tx.execute(sql`
    SELECT FROM patients
     WHERE id = (SELECT patient_id FROM prescriptions WHERE id = ${id}) FOR NO KEY UPDATE`);
  // A second statement, since it sees what was committed while the first waited.
  const ofSamePatient = tx
    .select({ patientId: prescriptions.patientId })
    .from(prescriptions)
    .where(eq(prescriptions.id, id));
  const rows = await tx
    .select()
    .from(prescriptions)
    .where(
      and(
        inArray(prescriptions.patientId, ofSamePatient),
        or(eq(prescriptions.id, id), inArray(prescriptions.status, ['active', 'draft'])),
      ),
    );
  const row = rows.find((each) => each.id === id);
  if (!row) return undefined;
  return {
    row,
    active: rows.find(({ status }) => status === 'active'),
    /** Signed and waiting for a physician, but for the prescription itself. */
    waiting: rows.filter(({ awaiting, id: each }) => awaiting !== null && each !== id),
  };
}

export type Locked = NonNullable<Awaited<ReturnType<typeof lockPrescription>>>;

/** The course of a prescription: whether it is open, and whether a range was ever in force in it. */
export async function courseOf(
  tx: Queryable,
  enrollmentId: string,
): Promise<{ readonly open: boolean; readonly hadRange: boolean }> {
  const { rows } = await tx.execute<{ open: boolean; hadRange: boolean }>(sql`
    SELECT e.status IN ('active', 'on-hold') AS open,
           EXISTS (SELECT FROM prescriptions p
             WHERE p.enrollment_id = e.id AND p.activated_at IS NOT NULL) AS "hadRange"
      FROM enrollments e WHERE e.id = ${enrollmentId}`);
  const [course] = rows;
  if (!course) throw new Error(`Enrollment ${enrollmentId} is gone`);
  return course;
}

/** Ends what is in force, and puts aside what is written, in a course that ends. */
export async function endRanges(tx: Transaction, enrollmentId: string, now: Date): Promise<void> {
  await tx.execute(sql`
    UPDATE prescriptions
       SET status = CASE status WHEN 'active' THEN 'completed' ELSE 'revoked' END::prescription_status,
           awaiting = NULL, ended_at = ${now.toISOString()}::timestamptz, version = version + 1
     WHERE enrollment_id = ${enrollmentId} AND status IN ('active', 'draft')`);
}

type Change = Partial<typeof prescriptions.$inferInsert>;

/** Writes signatures and the ends of a life; a trigger refuses everything else once it is signed. */
export async function writePrescription(tx: Transaction, id: string, change: Change) {
  await tx
    .update(prescriptions)
    .set({ ...change, version: sql`${prescriptions.version} + 1` })
    .where(eq(prescriptions.id, id));
}
