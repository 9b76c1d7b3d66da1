import type { MachineSetting } from '@shared/clinical/progression/machine-setting';
import type { Load, ProgressionProposal } from '@shared/clinical/progression/propose-progression';
import type { SessionReading } from '@shared/clinical/progression/session-facts';
import type { Minutes } from '@shared/units';
import { v7 as uuidv7 } from 'uuid';
import type { Transaction } from '../database/client';

/** A signed session as it was recorded, with the last work of its record. */
export interface SessionRow {
  readonly id: string;
  readonly localDate: string;
  readonly prescriptionId: string | null;
  readonly setting: MachineSetting | null;
  readonly minutes: Minutes | null;
  readonly shortBouts: boolean;
  readonly doseMissed: boolean;
  readonly readings: SessionReading[];
}

/** The last signed sessions in which the patient exercised, the newest first. */
export async function lastSessions(
  tx: Transaction,
  patientId: string,
  limit: number,
): Promise<SessionRow[]> {
  const { rows } = await tx.connection.query<SessionRow>({
    name: 'last-signed-sessions',
    text: `
      SELECT r.id, a.local_date::text AS "localDate", r.prescription_id AS "prescriptionId",
             b.setting, b.minutes, coalesce(b.short_bouts, false) AS "shortBouts",
             EXISTS (SELECT FROM missed_doses d
                      WHERE d.patient_id = r.patient_id AND d.local_date = a.local_date AND d.missed) AS "doseMissed",
             coalesce(v.readings, '[]') AS readings
        FROM session_records r
        JOIN appointments a ON a.id = r.appointment_id
        LEFT JOIN LATERAL (
          SELECT x.setting, x.minutes, x.short_bouts FROM exercise_bouts x
           WHERE x.session_record_id = r.id ORDER BY x.received_at DESC, x.id DESC LIMIT 1) b ON true
        LEFT JOIN LATERAL (
          SELECT json_agg(json_build_object('phase', x.phase, 'heartRate', x.heart_rate, 'systolic', x.systolic,
                   'diastolic', x.diastolic, 'oxygenSaturation', x.oxygen_saturation,
                   'perceivedExertion', x.perceived_exertion, 'symptoms', x.symptoms) ORDER BY x.measured_at, x.id) AS readings
            FROM vital_signs x
           WHERE x.session_record_id = r.id AND x.status NOT IN ('amended', 'entered-in-error')) v ON true
       WHERE r.patient_id = $1 AND r.signed_at IS NOT NULL AND r.exercised
       ORDER BY r.started_at DESC, r.id DESC LIMIT $2`,
    values: [patientId, limit],
  });
  return rows;
}

export interface NewProposal {
  readonly sessionRecordId: string;
  readonly patientId: string;
  readonly prescriptionId: string;
  readonly proposal: ProgressionProposal;
  readonly policyVersion: number;
  readonly engineVersion: string;
  readonly now: Date;
}

/** One a record: a second one is left out. */
export async function insertProposal(tx: Transaction, row: NewProposal): Promise<void> {
  await tx.connection.query({
    name: 'insert-progression-proposal',
    text: `
      INSERT INTO progression_proposals (id, session_record_id, patient_id, prescription_id, proposal, policy_version,
        engine_version, made_at)
      VALUES ($1, $2, $3, $4, $5, $6, $7, $8) ON CONFLICT (session_record_id) DO NOTHING`,
    values: [
      uuidv7(),
      row.sessionRecordId,
      row.patientId,
      row.prescriptionId,
      JSON.stringify(row.proposal),
      row.policyVersion,
      row.engineVersion,
      row.now,
    ],
  });
}

export interface Decision {
  readonly kind: 'accepted' | 'edited' | 'dismissed';
  readonly load: Load | null;
  readonly reason: string | null;
  readonly userId: string;
  readonly now: Date;
}

/** @returns whether this was the first decision */
export async function writeDecision(
  tx: Transaction,
  id: string,
  { kind, load, reason, userId, now }: Decision,
): Promise<boolean> {
  const { rowCount } = await tx.connection.query({
    name: 'decide-progression-proposal',
    text: `
      UPDATE progression_proposals
         SET decision = $2, decided_load = $3, decision_reason = $4, decided_at = $5, decided_by = $6
       WHERE id = $1 AND decision IS NULL`,
    values: [id, kind, load && JSON.stringify(load), reason, now, userId],
  });
  return rowCount === 1;
}
