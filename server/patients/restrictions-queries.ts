import {
  standingRestrictions,
  type RestrictedRecord,
  type StandingRestriction,
} from '@shared/clinical/restrictions/standing-restrictions';
import type { ResistancePolicy } from '@shared/clinical/training/resistance-policy';
import type { Transaction } from '../database/client';

interface Row extends RestrictedRecord {
  readonly patientId: string;
}

const TEXT = `
  SELECT p.id AS "patientId",
         coalesce((SELECT json_agg(json_build_object('kind', r.kind, 'limit', r."limit", 'diastolic', r.diastolic,
                     'detail', r.detail, 'until', r.until, 'lifted', r.ended_at IS NOT NULL) ORDER BY r.ordered_on, r.id)
                     FROM restrictions r WHERE r.patient_id = p.id AND r.entered_in_error_at IS NULL), '[]') AS orders,
         coalesce((SELECT json_agg(json_build_object('kind', e.kind, 'occurredOn', e.occurred_on))
                     FROM clinical_events e WHERE e.patient_id = p.id AND e.entered_in_error_at IS NULL), '[]') AS events,
         latest.dissection, latest.pad AS "peripheralArteryDisease"
    FROM patients p
   CROSS JOIN LATERAL (
     SELECT coalesce(bool_or(c.value = 'yes') FILTER (WHERE c.kind = 'dissection'), false) AS dissection,
            coalesce(bool_or(c.value = 'yes') FILTER (WHERE c.kind = 'peripheralArteryDisease'), false) AS pad
       FROM (SELECT DISTINCT ON (kind) kind, value FROM conditions
              WHERE patient_id = p.id AND entered_in_error_at IS NULL
              ORDER BY kind, recorded_at DESC) c) latest
   WHERE p.id = ANY($1::uuid[])`;

/**
 * What holds for each of these patients, by patient, in one statement.
 * @param today the local date of their class
 * @param policy for how many weeks an operation restricts where nobody has ordered
 */
export async function restrictionsOn(
  tx: Transaction,
  patientIds: readonly string[],
  today: string,
  policy: ResistancePolicy,
): Promise<ReadonlyMap<string, readonly StandingRestriction[]>> {
  const { rows } = await tx.connection.query<Row>({
    name: 'standing-restrictions',
    text: TEXT,
    values: [[...patientIds]],
  });
  return new Map(rows.map((row) => [row.patientId, standingRestrictions(row, today, policy)]));
}
