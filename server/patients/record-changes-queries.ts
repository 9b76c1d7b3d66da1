import { sql, type SQL } from 'drizzle-orm';
import type { WithdrawalReason } from '@shared/clinical/withdrawal';

/** A prescription as columns of the query around: whose, made when, of which inputs (JSON). */
interface RangeColumns {
  readonly patientId: SQL;
  readonly madeAt: SQL;
  readonly inputs: SQL;
}

const when = (condition: SQL, reason: WithdrawalReason): SQL =>
  sql`CASE WHEN ${condition} THEN ${reason}::text END`;

const drugsChanged = ({ patientId, madeAt }: RangeColumns): SQL => sql`EXISTS (
  SELECT FROM medications m
   WHERE m.patient_id = ${patientId} AND m.rate_acting IS NOT NULL
     AND CASE WHEN m.recorded_at > ${madeAt} THEN m.entered_in_error_at IS NULL
              ELSE m.stop_recorded_at > ${madeAt} OR m.entered_in_error_at > ${madeAt} END)`;

const rhythmChanged = ({ patientId, madeAt, inputs }: RangeColumns): SQL => sql`coalesce((
  SELECT r.recorded_at > ${madeAt} AND r.rhythm::text <> (${inputs} ->> 'rhythm')
    FROM rhythm_records r
   WHERE r.patient_id = ${patientId} AND r.entered_in_error_at IS NULL
   ORDER BY r.observed_on DESC, r.recorded_at DESC LIMIT 1), false)`;

const deviceChanged = ({ patientId, madeAt, inputs }: RangeColumns): SQL => sql`coalesce((
  SELECT d.recorded_at > ${madeAt}
     AND (d.icd_status::text, d.icd_zones, to_jsonb(d.upper_tracking_rate)) IS DISTINCT FROM
         (${inputs} #>> '{devices,icd,status}', ${inputs} #> '{devices,icd,zones}',
          nullif(${inputs} #> '{devices,upperTrackingRate}', 'null'))
    FROM cardiac_devices d
   WHERE d.patient_id = ${patientId} AND d.entered_in_error_at IS NULL
   ORDER BY d.checked_on DESC, d.recorded_at DESC LIMIT 1), false)`;

const thresholdFound = ({ patientId, madeAt }: RangeColumns): SQL => sql`EXISTS (
  SELECT FROM thresholds t
   WHERE t.patient_id = ${patientId} AND t.recorded_at > ${madeAt}
     AND t.entered_in_error_at IS NULL AND t.status = 'active')`;

const eventHappened = ({ patientId, madeAt }: RangeColumns): SQL => sql`EXISTS (
  SELECT FROM clinical_events e
   WHERE e.patient_id = ${patientId} AND e.recorded_at > ${madeAt} AND e.entered_in_error_at IS NULL)`;

/**
 * An SQL array of the reasons that withdraw a range, from what was entered since it was made: a rate-acting drug
 * started, stopped or changed; another rhythm or other device settings than the range rests on; a new threshold; an event.
 */
export function withdrawalOf(range: RangeColumns): SQL<WithdrawalReason[]> {
  return sql<WithdrawalReason[]>`array_remove(ARRAY[${sql.join(
    [
      when(drugsChanged(range), 'drugs'),
      when(rhythmChanged(range), 'rhythm'),
      when(deviceChanged(range), 'device'),
      when(thresholdFound(range), 'threshold'),
      when(eventHappened(range), 'event'),
    ],
    sql`, `,
  )}], NULL)`;
}
