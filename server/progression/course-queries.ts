import { metsOfSetting, type MachineSetting } from '@shared/clinical/progression/machine-setting';
import type { CourseSession } from '@shared/contracts/progression-contract';
import type { Kilograms, Minutes } from '@shared/units';
import type { Transaction } from '../database/client';

/** A whole course and a half on one chart. */
const sessionsShown = 60;

interface CourseRow extends Omit<CourseSession, 'load'> {
  readonly setting: MachineSetting | null;
  readonly minutes: Minutes | null;
  readonly weightKg: Kilograms | null;
}

/** The last signed sessions with exercise, the oldest first, each against the range that it was done under. */
export async function courseSoFar(tx: Transaction, patientId: string): Promise<CourseSession[]> {
  const { rows } = await tx.connection.query<CourseRow>({
    name: 'course-so-far',
    text: `
      SELECT r.id AS "sessionRecordId", a.local_date::text AS "localDate", v.*, b.setting, b.minutes,
             CASE WHEN r.range_withdrawn = '{}' THEN nullif(p.result -> 'target', 'null') END AS target,
             (p.result #>> '{ceiling,value}')::float AS ceiling,
             (p.result -> 'perceivedExertion') - 'scale' AS exertion,
             (p.inputs #>> '{patient,weightKg}')::float AS "weightKg"
        FROM session_records r
        JOIN appointments a ON a.id = r.appointment_id
        LEFT JOIN prescriptions p ON p.id = r.prescription_id
        LEFT JOIN LATERAL (
          SELECT x.setting, x.minutes FROM exercise_bouts x
           WHERE x.session_record_id = r.id ORDER BY x.received_at DESC, x.id DESC LIMIT 1) b ON true
        LEFT JOIN LATERAL (
          SELECT percentile_cont(0.5) WITHIN GROUP (ORDER BY x.heart_rate) AS "medianHeartRate",
                 max(x.heart_rate) AS "highestHeartRate",
                 percentile_cont(0.5) WITHIN GROUP (ORDER BY x.perceived_exertion) AS "medianExertion"
            FROM vital_signs x
           WHERE x.session_record_id = r.id AND x.phase = 'exercise'
             AND x.status NOT IN ('amended', 'entered-in-error')) v ON true
       WHERE r.patient_id = $1 AND r.signed_at IS NOT NULL AND r.exercised
       ORDER BY r.started_at DESC, r.id DESC LIMIT $2`,
    values: [patientId, sessionsShown],
  });
  return rows.reverse().map(({ setting, minutes, weightKg, ...session }) => ({
    ...session,
    load: setting && { setting, mets: metsOfSetting(setting, weightKg), minutes },
  }));
}
