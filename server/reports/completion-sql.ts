import type {
  AgeBand,
  CompletionDefinition,
  CompletionGrouping,
  CompletionPart,
} from '@shared/contracts/reports-contract';

// One text for the counts and for the lists behind them, so that the two can't disagree.

/** What a count or a list is about. Dates are local to the site, `to` exclusive. */
export interface CompletionScope {
  readonly definition: CompletionDefinition;
  readonly from: string;
  readonly to: string;
  readonly groupBy: CompletionGrouping;
  readonly now: Date;
  /** The sites that the reader may see. */
  readonly siteIds: readonly string[];
  readonly siteId?: string | undefined;
  readonly sex?: string | undefined;
  readonly ageBand?: AgeBand | undefined;
  readonly payer?: string | undefined;
  readonly diagnosis?: string | undefined;
}

/** The course's length as print has it: 36 sessions within 252 days (Keteyian 2022, Ritchey 2020). */
export const WINDOW_DAYS = 252;
export const STANDARD_COURSE = 36;

const AGE_BAND = `CASE
  WHEN p.birth_date > e.first_session_on - interval '55 years' THEN 'under-55'
  WHEN p.birth_date > e.first_session_on - interval '65 years' THEN '55-64'
  WHEN p.birth_date > e.first_session_on - interval '75 years' THEN '65-74'
  ELSE '75-and-over' END`;

const GROUPS: Readonly<Record<CompletionGrouping, string>> = {
  none: `'all'`,
  month: `to_char(e.first_session_on, 'YYYY-MM')`,
  site: 'e.site_id::text',
  sex: 'p.sex_at_birth::text',
  'age-band': AGE_BAND,
  payer: 'e.payer',
  diagnosis: 'e.qualifying_diagnosis::text',
};

const NEEDED: Readonly<Record<CompletionDefinition, string>> = {
  A: String(STANDARD_COURSE),
  B: 'e.planned_sessions',
};

/** A course is open until it is closed or its window has passed where the patient exercises. */
const STILL_OPEN = `e.status IN ('active', 'on-hold')
  AND (($3::timestamptz AT TIME ZONE s.time_zone)::date - e.first_session_on) <= ${WINDOW_DAYS}`;

/**
 * The courses of a scope, each with its group and its state. Takes the values of `scopeValues`. Supervised courses alone:
 * maintenance that people pay themselves (phase 3) follows no event and has no end to complete.
 */
export const courseRows = ({ definition, groupBy }: CompletionScope): string => `
  SELECT e.*, p.family_name, p.given_name, p.record_number, s.name AS site_name, ${GROUPS[groupBy]} AS grouped,
    CASE WHEN e.attended_in_window >= ${NEEDED[definition]} THEN 'completed'
         WHEN ${STILL_OPEN} THEN 'ongoing' ELSE 'left' END AS state
  FROM enrollments e
  JOIN patients p ON p.id = e.patient_id
  JOIN sites s ON s.id = e.site_id
  WHERE e.first_session_on >= $1::date AND e.first_session_on < $2::date
    AND e.phase = 2 AND e.site_id = ANY($4::uuid[])
    AND ($5::uuid IS NULL OR e.site_id = $5)
    AND ($6::text IS NULL OR p.sex_at_birth::text = $6)
    AND ($7::text IS NULL OR ${AGE_BAND} = $7)
    AND ($8::text IS NULL OR e.payer = $8)
    AND ($9::text IS NULL OR e.qualifying_diagnosis::text = $9)`;

export const scopeValues = (scope: CompletionScope): unknown[] => [
  scope.from,
  scope.to,
  scope.now,
  scope.siteIds,
  scope.siteId ?? null,
  scope.sex ?? null,
  scope.ageBand ?? null,
  scope.payer ?? null,
  scope.diagnosis ?? null,
];

/** Which of the courses a count holds. */
export const partOf: Readonly<Record<CompletionPart, string>> = {
  enrolled: 'true',
  completed: `state = 'completed'`,
  ongoing: `state = 'ongoing'`,
  left: `state = 'left'`,
};
