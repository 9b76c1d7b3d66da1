import type { PatientIdentifier, Reading } from '@shared/contracts/floor-contract';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';
import type { Placement } from '@shared/clinical/placement';
import type { PrescriptionAnswer } from '@shared/clinical/prescribing';
import type { Transaction } from '../database/client';
import { doseMissed } from '../prescriptions/floor-ranges-queries';
import type { SentReading } from './floor-policy';

/** A session record as a write needs it. */
export interface RecordRow {
  readonly id: string;
  readonly appointmentId: string;
  readonly patientId: string;
  readonly startedAt: Date;
  readonly identityConfirmedWith: PatientIdentifier[] | null;
  readonly prescriptionId: string | null;
  readonly rangeWithdrawn: string[];
  readonly signedAt: Date | null;
  readonly appointmentStatus: AppointmentStatus;
  readonly target: PrescriptionAnswer['target'];
  readonly ceiling: PrescriptionAnswer['ceiling'];
}

/** Why the range of a record `r` of a visit `a` does not lead: as it was withdrawn at the beginning, and the day's missed dose. */
export const RANGE_WITHDRAWN = `
  r.range_withdrawn || CASE WHEN EXISTS (
    SELECT FROM missed_doses d WHERE d.patient_id = r.patient_id AND d.local_date = a.local_date AND d.missed)
    THEN ARRAY['${doseMissed}'] ELSE '{}' END`;

const RECORD = `
  SELECT r.id, r.appointment_id AS "appointmentId", r.patient_id AS "patientId", r.started_at AS "startedAt",
         r.identity_confirmed_with AS "identityConfirmedWith", r.prescription_id AS "prescriptionId",
         ${RANGE_WITHDRAWN} AS "rangeWithdrawn", r.signed_at AS "signedAt", a.status AS "appointmentStatus",
         p.result -> 'target' AS target, p.result -> 'ceiling' AS ceiling
    FROM session_records r
    JOIN appointments a ON a.id = r.appointment_id
    LEFT JOIN prescriptions p ON p.id = r.prescription_id`;

/** The record, locked: `share` holds off a signature while readings go in, `sign` holds off everything else. */
export async function lockRecord(
  tx: Transaction,
  id: string,
  lock: 'share' | 'sign',
): Promise<RecordRow | undefined> {
  const { rows } = await tx.connection.query<RecordRow>({
    name: `lock-session-record-${lock}`,
    text: `${RECORD} WHERE r.id = $1 FOR ${lock === 'share' ? 'SHARE' : 'NO KEY UPDATE'} OF r`,
    values: [id],
  });
  return rows[0];
}

/** The record of this id or of this appointment, the former first; undefined when there is neither. */
export async function findRecord(
  tx: Transaction,
  id: string,
  appointmentId: string,
): Promise<RecordRow | undefined> {
  const { rows } = await tx.connection.query<RecordRow>({
    name: 'find-session-record',
    text: `${RECORD} WHERE r.id = $1 OR r.appointment_id = $2 ORDER BY (r.id = $1) DESC LIMIT 1`,
    values: [id, appointmentId],
  });
  return rows[0];
}

/** The appointment that a record is to begin for, undefined when there is none. */
export async function findVisit(
  tx: Transaction,
  appointmentId: string,
): Promise<{ readonly patientId: string; readonly status: AppointmentStatus } | undefined> {
  const { rows } = await tx.connection.query<{ patientId: string; status: AppointmentStatus }>({
    name: 'find-visit',
    text: 'SELECT patient_id AS "patientId", status FROM appointments WHERE id = $1',
    values: [appointmentId],
  });
  return rows[0];
}

export interface NewRecord {
  readonly id: string;
  readonly appointmentId: string;
  readonly patientId: string;
  readonly startedAt: Date;
  readonly prescriptionId: string | null;
  readonly rangeWithdrawn: readonly string[];
  readonly identityConfirmedWith: readonly PatientIdentifier[] | null;
  readonly recordedBy: string;
  readonly now: Date;
}

/** @returns whether it was made: not when the id or the appointment has a record already */
export async function insertRecord(tx: Transaction, row: NewRecord): Promise<boolean> {
  const made = await tx.connection.query({
    name: 'insert-session-record',
    text: `
      INSERT INTO session_records (id, appointment_id, patient_id, started_at, prescription_id, range_withdrawn,
        identity_confirmed_with, recorded_by, received_at)
      VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9) ON CONFLICT DO NOTHING`,
    values: [
      row.id,
      row.appointmentId,
      row.patientId,
      row.startedAt,
      row.prescriptionId,
      row.rangeWithdrawn,
      row.identityConfirmedWith,
      row.recordedBy,
      row.now,
    ],
  });
  return made.rowCount === 1;
}

/** A reading as it is stored, with the name of who recorded it. */
export interface ReadingRow extends SentReading {
  readonly id: string;
  readonly sessionRecordId: string;
  readonly patientId: string;
  readonly placement: Placement | null;
  readonly status: Reading['status'];
  readonly amends: string | null;
  readonly amendmentReason: string | null;
  readonly receivedAt: Date;
  readonly recordedBy: string;
}

/** The columns of a reading `v` recorded by `u`, named as in `ReadingRow`. */
export const READING_COLUMNS = `
  v.id, v.session_record_id AS "sessionRecordId", v.patient_id AS "patientId", v.phase, v.measured_at AS "measuredAt",
  v.heart_rate AS "heartRate", v.systolic, v.diastolic, v.oxygen_saturation AS "oxygenSaturation",
  v.perceived_exertion AS "perceivedExertion", v.symptoms, v.note, v.placement, v.status, v.amends,
  v.amendment_reason AS "amendmentReason", v.received_at AS "receivedAt", u.display_name AS "recordedBy"`;

/** @returns undefined when there is none */
export async function findReading(tx: Transaction, id: string): Promise<ReadingRow | undefined> {
  const { rows } = await tx.connection.query<ReadingRow>({
    name: 'find-reading',
    text: `SELECT ${READING_COLUMNS} FROM vital_signs v JOIN users u ON u.id = v.recorded_by WHERE v.id = $1`,
    values: [id],
  });
  return rows[0];
}

export interface NewReading extends Omit<ReadingRow, 'receivedAt' | 'recordedBy'> {
  readonly prescriptionId: string | null;
  readonly recordedBy: { readonly id: string; readonly displayName: string };
  readonly now: Date;
}

/** @returns the row, or null when the id is taken or another amendment came first */
export async function insertReading(tx: Transaction, row: NewReading): Promise<ReadingRow | null> {
  const { now, recordedBy, prescriptionId, ...stored } = row;
  const made = await tx.connection.query({
    name: 'insert-reading',
    text: `
      INSERT INTO vital_signs (id, session_record_id, patient_id, phase, measured_at, heart_rate, systolic, diastolic,
        oxygen_saturation, perceived_exertion, symptoms, note, placement, prescription_id, status, amends,
        amendment_reason, received_at, recorded_by)
      VALUES ($1, $2, $3, $4, $5, $6, $7, $8, $9, $10, $11, $12, $13, $14, $15, $16, $17, $18, $19)
      ON CONFLICT DO NOTHING`,
    values: [
      row.id,
      row.sessionRecordId,
      row.patientId,
      row.phase,
      row.measuredAt,
      row.heartRate,
      row.systolic,
      row.diastolic,
      row.oxygenSaturation,
      row.perceivedExertion,
      JSON.stringify(row.symptoms),
      row.note,
      row.placement,
      prescriptionId,
      row.status,
      row.amends,
      row.amendmentReason,
      now,
      recordedBy.id,
    ],
  });
  if (made.rowCount !== 1) return null;
  return { ...stored, receivedAt: now, recordedBy: recordedBy.displayName };
}

export async function markAmended(tx: Transaction, id: string): Promise<void> {
  await tx.connection.query({
    name: 'mark-reading-amended',
    text: `UPDATE vital_signs SET status = 'amended' WHERE id = $1`,
    values: [id],
  });
}

/** Signs a locked record that is not signed; what a student entered becomes final with it. */
export async function writeSignature(
  tx: Transaction,
  id: string,
  by: { readonly userId: string; readonly now: Date; readonly exercised: boolean | null },
): Promise<{ readonly exercised: boolean }> {
  await tx.connection.query({
    name: 'finalize-readings',
    text: `UPDATE vital_signs SET status = 'final' WHERE session_record_id = $1 AND status = 'preliminary'`,
    values: [id],
  });
  const { rows } = await tx.connection.query<{ exercised: boolean }>({
    name: 'sign-session-record',
    text: `
      UPDATE session_records SET signed_at = $2, signed_by = $3, exercised = coalesce($4, EXISTS (
        SELECT FROM vital_signs v
         WHERE v.session_record_id = $1 AND v.phase = 'exercise' AND v.status = 'final'))
       WHERE id = $1 RETURNING exercised`,
    values: [id, by.now, by.userId, by.exercised],
  });
  if (!rows[0]) throw new Error('A locked session record was not signed');
  return rows[0];
}

/** The visit's day counts as one with or without the dose. */
export async function writeMissedDose(
  tx: Transaction,
  day: {
    readonly appointmentId: string;
    readonly missed: boolean;
    readonly recordedBy: string;
    readonly now: Date;
  },
): Promise<void> {
  const { appointmentId, missed, recordedBy, now } = day;
  await tx.connection.query({
    name: 'write-missed-dose',
    text: `
      INSERT INTO missed_doses AS d (patient_id, local_date, missed, recorded_at, recorded_by)
      SELECT a.patient_id, a.local_date, $2, $3, $4 FROM appointments a WHERE a.id = $1
      ON CONFLICT (patient_id, local_date)
      DO UPDATE SET missed = EXCLUDED.missed, recorded_at = EXCLUDED.recorded_at, recorded_by = EXCLUDED.recorded_by
      WHERE d.missed <> EXCLUDED.missed`,
    values: [appointmentId, missed, now, recordedBy],
  });
}
