import { sql, type SQL } from 'drizzle-orm';
import type { PrescriptionFact } from '@shared/clinical/prescribing/effect-of-fact';
import { doseChange, effectOf, type RangeFlag } from '@shared/clinical/range-flags';

/** A prescription as columns of the query around: whose, made when, of which inputs (JSON). */
interface RangeColumns {
  readonly patientId: SQL;
  readonly madeAt: SQL;
  readonly inputs: SQL;
  /** When it entered into force; null of a draft. */
  readonly activatedAt: SQL;
  readonly now: SQL;
}

/** A cause as the database tells it; what a change of dose comes to is told by its numbers. */
export interface RawFlag {
  readonly fact: PrescriptionFact;
  readonly effect: RangeFlag['effect'];
  readonly detail: string | null;
  /** What it is now and what it was, where it is a number that moved. */
  readonly is: string | null;
  readonly was: string | null;
  readonly at: string;
  readonly by: string | null;
}

interface Cause {
  readonly fact: PrescriptionFact;
  readonly detail?: SQL;
  readonly is?: SQL;
  readonly was?: SQL;
  readonly at: SQL;
  readonly by: SQL;
  /** From `FROM` on. */
  readonly from: SQL;
}

const select = ({ fact, detail, is, was, at, by, from }: Cause): SQL => sql`
  SELECT ${sql.raw(`'${fact}'`)} AS fact, ${sql.raw(`'${effectOf(fact)}'`)} AS effect,
         ${detail ?? sql`NULL`}::text AS detail, ${is ?? sql`NULL`}::text AS is_now, ${was ?? sql`NULL`}::text AS was, ${at} AS at, ${by} AS by_id ${from}`;

const drugName = sql`m.name || ' ' || m.dose`;
const drugs = (patientId: SQL, condition: SQL): SQL => sql`
  FROM medications m WHERE m.patient_id = ${patientId} AND m.rate_acting IS NOT NULL AND ${condition}`;

/** A change of dose stops one entry and starts the next: one cause. */
const drugCauses = ({ patientId, madeAt }: RangeColumns): Cause[] => [
  {
    fact: 'rate-acting-drug-started',
    detail: drugName,
    at: sql`m.recorded_at`,
    by: sql`m.recorded_by`,
    from: drugs(
      patientId,
      sql`m.recorded_at > ${madeAt} AND m.entered_in_error_at IS NULL AND m.replaces IS NULL`,
    ),
  },
  {
    fact: 'rate-acting-drug-changed',
    detail: sql`m.name`,
    is: sql`m.dose`,
    was: sql`(SELECT o.dose FROM medications o WHERE o.id = m.replaces)`,
    at: sql`m.recorded_at`,
    by: sql`m.recorded_by`,
    from: drugs(
      patientId,
      sql`m.recorded_at > ${madeAt} AND m.entered_in_error_at IS NULL AND m.replaces IS NOT NULL`,
    ),
  },
  {
    fact: 'rate-acting-drug-stopped',
    detail: drugName,
    at: sql`m.stop_recorded_at`,
    by: sql`m.stop_recorded_by`,
    from: drugs(
      patientId,
      sql`m.recorded_at <= ${madeAt} AND m.stop_recorded_at > ${madeAt} AND m.entered_in_error_at IS NULL
        AND NOT EXISTS (SELECT FROM medications n WHERE n.replaces = m.id AND n.entered_in_error_at IS NULL)`,
    ),
  },
  {
    fact: 'rate-acting-drug-changed',
    detail: sql`m.name || ', entry taken back'`,
    at: sql`m.entered_in_error_at`,
    by: sql`m.entered_in_error_by`,
    from: drugs(patientId, sql`m.recorded_at <= ${madeAt} AND m.entered_in_error_at > ${madeAt}`),
  },
];

/** The latest entry of its kind, where it was made since and says something else than the range rests on. */
const latest = (of: SQL, differs: SQL): SQL => sql`FROM (${of} LIMIT 1) l WHERE ${differs}`;

const stateCauses = ({ patientId, madeAt, inputs }: RangeColumns): Cause[] => [
  {
    fact: 'rhythm-changed',
    detail: sql`l.rhythm`,
    at: sql`l.recorded_at`,
    by: sql`l.recorded_by`,
    from: latest(
      sql`SELECT r.rhythm::text, r.recorded_at, r.recorded_by FROM rhythm_records r
           WHERE r.patient_id = ${patientId} AND r.entered_in_error_at IS NULL
           ORDER BY r.observed_on DESC, r.recorded_at DESC`,
      sql`l.recorded_at > ${madeAt} AND l.rhythm <> (${inputs} ->> 'rhythm')`,
    ),
  },
  {
    fact: 'device-changed',
    at: sql`l.recorded_at`,
    by: sql`l.recorded_by`,
    from: latest(
      sql`SELECT d.* FROM cardiac_devices d
           WHERE d.patient_id = ${patientId} AND d.entered_in_error_at IS NULL
           ORDER BY d.checked_on DESC, d.recorded_at DESC`,
      sql`l.recorded_at > ${madeAt}
        AND (l.icd_status::text, l.icd_zones, to_jsonb(l.upper_tracking_rate)) IS DISTINCT FROM
            (${inputs} #>> '{devices,icd,status}', ${inputs} #> '{devices,icd,zones}',
             nullif(${inputs} #> '{devices,upperTrackingRate}', 'null'))`,
    ),
  },
  {
    fact: 'resting-rate-drifted',
    is: sql`l.seated || ' bpm'`,
    was: sql`(${inputs} #>> '{resting,seated}') || ' bpm'`,
    at: sql`l.recorded_at`,
    by: sql`l.recorded_by`,
    from: latest(
      sql`SELECT r.seated, r.recorded_at, r.recorded_by FROM resting_rates r
           WHERE r.patient_id = ${patientId} AND r.entered_in_error_at IS NULL
           ORDER BY r.measured_on DESC, r.recorded_at DESC`,
      sql`l.recorded_at > ${madeAt} AND abs(l.seated - (${inputs} #>> '{resting,seated}')::float) > (
        SELECT (content #>> '{resting,maximumSpread}')::float FROM policies ORDER BY version DESC LIMIT 1)`,
    ),
  },
];

const procedures = sql`('stent', 'bypass', 'valve', 'transplant', 'device-implant', 'ablation', 'cardioversion')`;

const event = ({ patientId, madeAt }: RangeColumns, fact: PrescriptionFact, kind: SQL): Cause => ({
  fact,
  detail: sql`e.description`,
  at: sql`e.recorded_at`,
  by: sql`e.recorded_by`,
  from: sql`FROM clinical_events e WHERE e.patient_id = ${patientId} AND e.recorded_at > ${madeAt}
    AND e.entered_in_error_at IS NULL AND ${kind}`,
});

/** A test or walk that stands, and that the range cannot rest on since it was not there yet. */
const repeated = (
  { patientId, madeAt }: RangeColumns,
  fact: PrescriptionFact,
  table: SQL,
  detail: SQL,
): Cause => ({
  fact,
  detail,
  at: sql`t.recorded_at`,
  by: sql`t.recorded_by`,
  from: sql`FROM ${table} t
    WHERE t.patient_id = ${patientId} AND t.recorded_at > ${madeAt} AND t.entered_in_error_at IS NULL`,
});

const foundCauses = (range: RangeColumns): Cause[] => [
  {
    fact: 'threshold-added',
    detail: sql`t.kind || ' at ' || t.heart_rate || ' bpm'`,
    at: sql`t.recorded_at`,
    by: sql`t.recorded_by`,
    from: sql`FROM thresholds t WHERE t.patient_id = ${range.patientId} AND t.recorded_at > ${range.madeAt}
      AND t.entered_in_error_at IS NULL AND t.status = 'active'`,
  },
  event(range, 'syncope', sql`e.kind = 'syncope'`),
  event(range, 'procedure', sql`e.kind IN ${procedures}`),
  event(range, 'cardiac-event', sql`e.kind <> 'syncope' AND e.kind NOT IN ${procedures}`),
  repeated(
    range,
    'exercise-test-repeated',
    sql`exercise_tests`,
    sql`'peak ' || t.peak_heart_rate || ' bpm'`,
  ),
  repeated(range, 'walk-test-repeated', sql`walk_tests`, sql`t.distance_meters || ' m'`),
];

const timeCauses = ({ patientId, activatedAt, now }: RangeColumns): Cause[] => [
  {
    fact: 'review-days-passed',
    at: sql`due.at`,
    by: sql`NULL::uuid`,
    from: sql`FROM (SELECT ${activatedAt} + make_interval(days => (
        SELECT (content ->> 'reviewDueDays')::int FROM policies ORDER BY version DESC LIMIT 1)) AS at) due
      WHERE due.at < ${now}`,
  },
  {
    fact: 'dose-missed-today',
    at: sql`d.recorded_at`,
    by: sql`d.recorded_by`,
    from: sql`FROM missed_doses d
      JOIN patients dp ON dp.id = d.patient_id JOIN sites ds ON ds.id = dp.site_id
     WHERE d.patient_id = ${patientId} AND d.missed AND d.local_date = (${now} AT TIME ZONE ds.time_zone)::date`,
  },
];

/**
 * What was saved since a range was made that touches it (rule 13), as a JSON array of `RawFlag`, the oldest first: one
 * cause, one flag. Derived from the facts themselves, so that none is ever saved without its flag.
 */
export function rangeFlagsOf(range: RangeColumns): SQL<RawFlag[]> {
  const causes = [
    ...drugCauses(range),
    ...stateCauses(range),
    ...foundCauses(range),
    ...timeCauses(range),
  ].map(select);
  return sql<RawFlag[]>`coalesce((
    SELECT jsonb_agg(jsonb_build_object('fact', f.fact, 'effect', f.effect, 'detail', f.detail, 'is', f.is_now, 'was', f.was, 'at', f.at,
             'by', u.display_name) ORDER BY f.at, f.fact)
      FROM (${sql.join(causes, sql` UNION ALL `)}) f LEFT JOIN users u ON u.id = f.by_id), '[]')`;
}

/** A cause as it is shown. */
export function presentFlag({ fact, effect, detail, is, was, at, by }: RawFlag): RangeFlag {
  const moved = is !== null && was !== null ? `${is}, was ${was}` : null;
  const words = [detail, moved].filter((part) => part !== null);
  return {
    fact: fact === 'rate-acting-drug-changed' && is !== null ? doseChange(was, is) : fact,
    effect,
    detail: words.length > 0 ? words.join(' ') : null,
    at: new Date(at).toISOString(),
    by,
  };
}
