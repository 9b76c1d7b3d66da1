import { sql } from 'drizzle-orm';
import type { Worksheet } from '@shared/contracts/prescriptions-worksheet-contract';
import { localDateAt } from '@shared/scheduling/wall-time';
import type { Actor } from '../accounts/actor';
import type { Queryable, Transaction } from '../database/client';
import { fail } from '../http/failure';
import { prescribingInputs } from '../patients/prescribing-inputs-queries';
import { patientColumns, withAge, type PatientColumns } from './patient-columns';
import { policyInForce } from './policy-queries';
import { rangeInForce } from './range-in-force-queries';

interface HeadRow extends Record<string, unknown> {
  readonly patient: PatientColumns['patient'];
  readonly course: PatientColumns['course'] | null;
  readonly first: boolean;
}

/** Whom the worksheet is for, with the course that runs, else the last. */
async function headOf(db: Queryable, patientId: string): Promise<HeadRow> {
  const { rows } = await db.execute<HeadRow & { enrollmentId: string | null }>(sql`
    SELECT ${patientColumns}, e.id AS "enrollmentId",
           NOT EXISTS (SELECT FROM prescriptions f
             WHERE f.enrollment_id = e.id AND f.activated_at IS NOT NULL) AS first
      FROM patients pt
      JOIN sites s ON s.id = pt.site_id
      LEFT JOIN enrollments e ON e.patient_id = pt.id
     WHERE pt.id = ${patientId}
     ORDER BY e.status IN ('active', 'on-hold') DESC, e.enrolled_on DESC, e.id DESC
     LIMIT 1`);
  const [row] = rows;
  if (!row) throw fail('not-found');
  return { ...row, course: row.enrollmentId === null ? null : row.course };
}

/** The highest rate at exercise of the last signed session that has one; what was amended counts no more. */
async function lastPeakOf(db: Queryable, patientId: string): Promise<Worksheet['lastPeak']> {
  const { rows } = await db.execute<{ heartRate: number; on: string }>(sql`
    SELECT max(v.heart_rate) AS "heartRate", a.local_date::text AS on
      FROM session_records r
      JOIN appointments a ON a.id = r.appointment_id
      JOIN vital_signs v ON v.session_record_id = r.id
     WHERE r.patient_id = ${patientId} AND r.signed_at IS NOT NULL AND v.phase = 'exercise'
       AND v.heart_rate IS NOT NULL AND v.status NOT IN ('amended', 'entered-in-error')
     GROUP BY r.id, a.local_date
     ORDER BY a.local_date DESC, r.id DESC LIMIT 1`);
  return rows[0] ?? null;
}

/** All that a worksheet begins with. @throws Failure `not-found` */
export async function worksheetOf(
  tx: Transaction,
  actor: Actor,
  patientId: string,
  now: Date,
): Promise<Worksheet> {
  const { patient, course, first } = await headOf(tx, patientId);
  const today = localDateAt(now, patient.site.timeZone);
  const policy = await policyInForce(tx.connection, now);
  const record = await prescribingInputs(tx, patientId, today, policy.test.validDays);
  if (!record) throw fail('not-found');
  const range = await rangeInForce(tx, patientId, now);
  return {
    patient: withAge(patient, now),
    course,
    today,
    record,
    policy,
    first,
    student: actor.student,
    inForce: range
      ? {
          prescriptionId: range.prescriptionId,
          activatedAt: range.activatedAt.toISOString(),
          withdrawn: [...range.withdrawn],
          reviewDue: range.reviewDue,
          flags: [...range.flags],
        }
      : null,
    lastPeak: await lastPeakOf(tx, patientId),
  };
}
