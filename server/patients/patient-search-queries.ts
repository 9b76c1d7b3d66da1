import { sql, type SQL } from 'drizzle-orm';
import type { Enrollment } from '@shared/contracts/patients-contract';
import { openRecordsOf, openRecordsPrepared } from '../accounts/access-policy';
import type { Actor } from '../accounts/actor';
import type { Transaction } from '../database/client';
import { enrollments, patients, sites } from '../database/schema';
import { statement } from '../database/statement';

interface FoundRow {
  readonly id: string;
  readonly familyName: string;
  readonly givenName: string;
  readonly recordNumber: string;
  readonly birthDate: string;
  readonly siteId: string;
  readonly siteName: string;
  readonly timeZone: string;
  readonly enrollmentId: string | null;
  readonly status: Enrollment['status'];
  readonly attended: number;
  readonly planned: number;
}

const found = (q: unknown): SQL => sql`${patients.searchTerms} @@ patient_search_query(${q})`;
const matches = found(sql.placeholder('q'));

/** Whether a patient is found by words of a name, a record number or a birth date: a condition for other lists of patients. */
export const matchesSearch = (q: string): SQL => found(q);

const isAfter = sql`(${patients.familyName}, ${patients.givenName}, ${patients.id}) >
  (${sql.placeholder('familyName')}, ${sql.placeholder('givenName')}, ${sql.placeholder('id')}::uuid)`;

/** The page is cut first; then each of its rows is joined with its site and its course: the one that runs, else the last. */
const pageOfPatients = (conditions: readonly SQL[]): SQL => sql`
  SELECT page.id, page.family_name AS "familyName", page.given_name AS "givenName", page.record_number AS "recordNumber",
         page.birth_date::text AS "birthDate", page.site_id AS "siteId", site.name AS "siteName", site.time_zone AS "timeZone",
         course.id AS "enrollmentId", course.status, course.attended, course.planned_sessions AS planned
    FROM (SELECT * FROM ${patients} WHERE ${sql.join([openRecordsPrepared, ...conditions], sql` AND `)}
           ORDER BY ${patients.familyName}, ${patients.givenName}, ${patients.id} LIMIT ${sql.placeholder('rows')}) page
    JOIN ${sites} site ON site.id = page.site_id
    LEFT JOIN LATERAL (
      SELECT * FROM ${enrollments} e WHERE e.patient_id = page.id
       ORDER BY e.status IN ('active', 'on-hold') DESC, e.enrolled_on DESC, e.id DESC LIMIT 1) course ON true
   ORDER BY page.family_name, page.given_name, page.id`;

/** What words find is known by the words alone: only lists without any are planned once for all. */
const statements = {
  all: statement<FoundRow>('patients-first-page', pageOfPatients([])),
  allAfter: statement<FoundRow>('patients-next-page', pageOfPatients([isAfter])),
  found: statement<FoundRow>(null, pageOfPatients([matches])),
  foundAfter: statement<FoundRow>(null, pageOfPatients([matches, isAfter])),
};

/** Where a list by name goes on: after this patient. */
export interface NamePosition {
  readonly familyName: string;
  readonly givenName: string;
  readonly id: string;
}

interface Search {
  /** Words that hold nothing to search by find nobody; no words at all find everybody. */
  readonly q: string | undefined;
  readonly after: NamePosition | null;
  readonly limit: number;
}

function present(row: FoundRow) {
  const { siteId, siteName, timeZone, enrollmentId, status, attended, planned, ...patient } = row;
  return {
    ...patient,
    site: { id: siteId, name: siteName, timeZone },
    course: enrollmentId === null ? null : { enrollmentId, status, attended, planned },
  };
}

export type FoundPatient = ReturnType<typeof present>;

/**
 * A page of the patients whose records the actor may open, by family name, given name and id, as people sort names.
 * @returns one more than `limit` when there are more
 */
export async function searchPatients(
  tx: Transaction,
  actor: Actor,
  { q, after, limit }: Search,
): Promise<FoundPatient[]> {
  const words = q?.trim() ? q : undefined;
  const kind = words === undefined ? 'all' : 'found';
  const values = { ...openRecordsOf(actor), ...after, q: words, rows: limit + 1 };
  const rows = await statements[after ? (`${kind}After` as const) : kind](tx, values);
  return rows.map(present);
}
