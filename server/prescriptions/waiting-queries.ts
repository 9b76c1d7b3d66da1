import { sql, type SQL } from 'drizzle-orm';
import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import type { ProgressionAction } from '@shared/clinical/progression/propose-progression';
import type { TaskKind } from '@shared/contracts/prescriptions-waiting-contract';
import type { Queryable } from '../database/client';
import type { RawFlag } from '../patients/record-changes-queries';
import { patientColumns, type PatientColumns } from './patient-columns';
import { flagsOfPrescription } from './range-in-force-queries';

/** A list of this length is a morning's work; more are counted, and shown as the first are done. */
const awaitingShown = 50;
const tasksShown = 100;

export interface AwaitingRow extends PatientColumns {
  readonly id: string;
  readonly version: number;
  readonly inputs: PrescriptionRequest;
  readonly result: PrescriptionAnswer;
  readonly flags: RawFlag[];
  readonly signedAt: Date | string;
  readonly signedBy: { readonly id: string; readonly displayName: string };
  readonly byStudent: boolean;
  readonly first: boolean;
  readonly total: number;
}

const uuids = (ids: readonly string[]): SQL => sql`${sql.param([...ids])}::uuid[]`;

/** The ranges of these sites' patients that wait for a physician, the longest waiting first, in one statement. */
export async function awaitingPhysician(
  db: Queryable,
  siteIds: readonly string[],
): Promise<AwaitingRow[]> {
  const { rows } = await db.execute<AwaitingRow>(sql`
    SELECT p.id, p.version, p.inputs, p.result, ${flagsOfPrescription(sql`p.signed_at`)} AS flags, p.signed_at AS "signedAt",
           json_build_object('id', u.id, 'displayName', u.display_name) AS "signedBy", u.student AS "byStudent",
           NOT EXISTS (SELECT FROM prescriptions f
             WHERE f.enrollment_id = p.enrollment_id AND f.activated_at IS NOT NULL) AS first,
           (count(*) OVER ())::int AS total, ${patientColumns}
      FROM prescriptions p
      JOIN patients pt ON pt.id = p.patient_id
      JOIN sites s ON s.id = pt.site_id
      JOIN enrollments e ON e.id = p.enrollment_id
      JOIN users u ON u.id = p.signed_by
     WHERE p.awaiting IS NOT NULL AND pt.site_id = ANY(${uuids(siteIds)})
     ORDER BY p.signed_at, p.id
     LIMIT ${awaitingShown}`);
  return rows;
}

export interface TaskRow extends PatientColumns {
  readonly kind: TaskKind;
  readonly prescriptionId: string | null;
  readonly since: Date | string | null;
  readonly by: string | null;
  readonly flags: RawFlag[];
  readonly step: ProgressionAction | null;
  readonly total: number;
}

/** What the range in force of an active course asks for, or that there is none, nor one under way; null: nothing. */
const rangeTasks = (siteIds: readonly string[], now: Date): SQL => sql`
  SELECT CASE WHEN p.id IS NULL AND NOT EXISTS (
                SELECT FROM prescriptions d WHERE d.enrollment_id = e.id AND d.status = 'draft') THEN 'without-range'
              WHEN w.flags @? '$[*] ? (@.effect == "withdrawn")' THEN 'withdrawn'
              WHEN w.flags @? '$[*] ? (@.effect == "review-due")' THEN 'review-due' END AS kind,
         e.id AS enrollment_id, p.id AS prescription_id, p.activated_at AS since, p.signed_by AS by_id,
         coalesce(w.flags, '[]') AS flags, NULL AS step
    FROM enrollments e
    JOIN patients pt ON pt.id = e.patient_id AND pt.site_id = ANY(${uuids(siteIds)})
    LEFT JOIN prescriptions p ON p.patient_id = e.patient_id AND p.status = 'active'
    LEFT JOIN LATERAL (SELECT ${flagsOfPrescription(sql`${now.toISOString()}::timestamptz`)} AS flags) w ON p.id IS NOT NULL
   WHERE e.status = 'active'`;

const draftTasks = (siteIds: readonly string[]): SQL => sql`
  SELECT CASE WHEN p.awaiting IS NULL THEN 'unsigned' ELSE 'awaiting-physician' END AS kind,
         p.enrollment_id, p.id AS prescription_id, coalesce(p.signed_at, p.changed_at, p.created_at) AS since,
         coalesce(p.signed_by, p.created_by) AS by_id, '[]'::jsonb AS flags, NULL AS step
    FROM prescriptions p
    JOIN patients pt ON pt.id = p.patient_id AND pt.site_id = ANY(${uuids(siteIds)})
   WHERE p.status = 'draft'`;

const activeCourses = (siteIds: readonly string[]): SQL => sql`
  enrollments e JOIN patients pt ON pt.id = e.patient_id AND pt.site_id = ANY(${uuids(siteIds)}) AND e.status = 'active'`;

/** Records of classes that are over and that nobody has signed. */
const recordTasks = (siteIds: readonly string[], now: Date): SQL => sql`
  SELECT 'record-unsigned' AS kind, e.id, NULL::uuid, r.started_at, r.recorded_by, '[]'::jsonb, NULL
    FROM ${activeCourses(siteIds)}
    JOIN session_records r ON r.patient_id = e.patient_id AND r.signed_at IS NULL
    JOIN appointments a ON a.id = r.appointment_id AND a.status = 'checked-in' AND a.ends_at < ${now.toISOString()}::timestamptz`;

/** Whose last two sessions both ran mostly above the range, or mostly below it. */
const sessionTasks = (siteIds: readonly string[]): SQL => sql`
  SELECT CASE WHEN count(*) = 2 AND bool_and(s.above) THEN 'ran-above'
              WHEN count(*) = 2 AND bool_and(s.below) THEN 'ran-below' END,
         e.id, NULL::uuid, max(r.started_at), NULL::uuid, '[]'::jsonb, NULL
    FROM ${activeCourses(siteIds)}
   CROSS JOIN LATERAL (
     SELECT x.id, x.started_at FROM session_records x
      WHERE x.patient_id = e.patient_id AND x.signed_at IS NOT NULL AND x.exercised
      ORDER BY x.started_at DESC LIMIT 2) r
   CROSS JOIN LATERAL (
     SELECT 2 * count(*) FILTER (WHERE v.placement IN ('above', 'over-ceiling')) > count(*) AS above,
            2 * count(*) FILTER (WHERE v.placement = 'below') > count(*) AS below
       FROM vital_signs v
      WHERE v.session_record_id = r.id AND v.phase = 'exercise' AND v.placement IS NOT NULL
        AND v.status NOT IN ('amended', 'entered-in-error')) s
   GROUP BY e.id`;

/** Next steps that say more than to hold, under a range in force and not withdrawn, that nobody has decided on. */
const stepTasks = (siteIds: readonly string[], now: Date): SQL => sql`
  SELECT 'next-step', e.id, g.prescription_id, g.made_at, NULL::uuid, '[]'::jsonb, g.proposal ->> 'action'
    FROM ${activeCourses(siteIds)}
    JOIN progression_proposals g ON g.patient_id = e.patient_id AND g.decision IS NULL
    JOIN prescriptions p ON p.id = g.prescription_id AND p.status = 'active'
   CROSS JOIN LATERAL (SELECT ${flagsOfPrescription(sql`${now.toISOString()}::timestamptz`)} AS flags) w
   WHERE (w.flags @? '$[*] ? (@.effect == "withdrawn")') IS NOT TRUE AND g.proposal ->> 'action' <> 'hold'
     AND NOT EXISTS (SELECT FROM progression_proposals l WHERE l.patient_id = g.patient_id AND l.made_at > g.made_at)`;

/** What to see to for these sites' patients: by kind, the longest waiting first, in one statement. */
export async function prescribingTasks(
  db: Queryable,
  siteIds: readonly string[],
  now: Date,
): Promise<TaskRow[]> {
  const parts = [
    rangeTasks(siteIds, now),
    draftTasks(siteIds),
    recordTasks(siteIds, now),
    sessionTasks(siteIds),
    stepTasks(siteIds, now),
  ];
  const { rows } = await db.execute<TaskRow>(sql`
    SELECT * FROM (
      SELECT t.kind, t.prescription_id AS "prescriptionId", t.since, u.display_name AS by, t.flags, t.step,
             (count(*) OVER (PARTITION BY t.kind))::int AS total,
             row_number() OVER (PARTITION BY t.kind ORDER BY t.since, pt.family_name, pt.given_name, pt.id) AS place,
             ${patientColumns}
        FROM (${sql.join(parts, sql` UNION ALL `)}) t
        JOIN enrollments e ON e.id = t.enrollment_id
        JOIN patients pt ON pt.id = e.patient_id
        JOIN sites s ON s.id = pt.site_id
        LEFT JOIN users u ON u.id = t.by_id
       WHERE t.kind IS NOT NULL) tasks
     WHERE place <= ${tasksShown} ORDER BY kind, place`);
  return rows;
}
