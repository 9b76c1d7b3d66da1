import type { Transaction } from '../database/client';
import { proposeAfterSession } from '../progression/progression-service';

/**
 * The next step after the last signed session of whoever has a class from now on within two days, as the server would have
 * kept it with the signature.
 */
export async function applySteps(tx: Transaction, now: Date): Promise<void> {
  const { rows } = await tx.connection.query<{ recordId: string; patientId: string }>(
    `SELECT DISTINCT ON (r.patient_id) r.id AS "recordId", r.patient_id AS "patientId"
       FROM session_records r
      WHERE r.signed_at IS NOT NULL AND r.exercised AND r.started_at > $1::timestamptz - interval '14 days'
        AND EXISTS (SELECT FROM appointments a
                     WHERE a.patient_id = r.patient_id AND a.status IN ('booked', 'arrived', 'checked-in')
                       AND a.starts_at BETWEEN $1::timestamptz - interval '2 hours' AND $1::timestamptz + interval '2 days')
        AND NOT EXISTS (SELECT FROM progression_proposals g WHERE g.session_record_id = r.id)
      ORDER BY r.patient_id, r.started_at DESC, r.id DESC`,
    [now],
  );
  for (const record of rows) await proposeAfterSession(tx, { ...record, now });
}
