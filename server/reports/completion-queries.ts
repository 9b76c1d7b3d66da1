import type { CompletionPart, CompletionPatient } from '@shared/contracts/reports-contract';
import type { Database, Transaction } from '../database/client';
import { courseRows, partOf, scopeValues, type CompletionScope } from './completion-sql';

/** The counts of one group; `group` is null in the row of the total. */
export interface CompletionCounts {
  readonly group: string | null;
  /** The name of a group that is a row of a table, as a site. */
  readonly name: string | null;
  readonly enrolled: number;
  readonly completed: number;
  readonly ongoing: number;
  readonly sessions: number;
}

/** Counts by group and in all, in one statement over the counters kept on the courses. */
export async function completionCounts(
  database: Database,
  scope: CompletionScope,
): Promise<CompletionCounts[]> {
  const { rows } = await database.$client.query<CompletionCounts>({
    name: `completion-${scope.definition}-${scope.groupBy}`,
    text: `
      SELECT grouped AS "group", min(site_name) AS name, count(*)::int AS enrolled,
        count(*) FILTER (WHERE ${partOf.completed})::int AS completed,
        count(*) FILTER (WHERE ${partOf.ongoing})::int AS ongoing,
        coalesce(sum(attended), 0)::int AS sessions
      FROM (${courseRows(scope)}) course
      GROUP BY GROUPING SETS ((grouped), ()) ORDER BY GROUPING(grouped), grouped`,
    values: scopeValues(scope),
  });
  return rows;
}

/** Where a page of the list ended. */
export type CourseAfter = readonly [familyName: string, givenName: string, enrollmentId: string];

export interface CompletionList {
  readonly part: CompletionPart;
  readonly group?: string | undefined;
  readonly after?: CourseAfter | undefined;
  readonly limit: number;
}

export type CourseRow = Omit<CompletionPatient, 'displayName'> & {
  readonly familyName: string;
  readonly givenName: string;
  readonly total: number;
};

/** The courses behind one count, by name; asks for one more than the limit to tell whether there are more. */
export async function completionCourses(
  tx: Transaction,
  scope: CompletionScope,
  { part, group, after, limit }: CompletionList,
): Promise<CourseRow[]> {
  const { rows } = await tx.connection.query<CourseRow>({
    name: `completion-list-${scope.definition}-${scope.groupBy}-${part}`,
    text: `
      SELECT * FROM (
        SELECT id AS "enrollmentId", patient_id AS "patientId", family_name AS "familyName", given_name AS "givenName",
          record_number AS "recordNumber", site_name AS site, qualifying_diagnosis AS diagnosis,
          first_session_on::text AS "firstSessionOn", last_session_on::text AS "lastSessionOn",
          attended, attended_in_window AS "attendedInWindow", planned_sessions AS planned, state,
          closed_reason AS "closedReason", (count(*) OVER ())::int AS total
        FROM (${courseRows(scope)}) course
        WHERE ${partOf[part]} AND ($10::text IS NULL OR grouped = $10)
      ) listed
      WHERE $11::text IS NULL OR ("familyName", "givenName", "enrollmentId") > ($11, $12, $13::uuid)
      ORDER BY "familyName", "givenName", "enrollmentId" LIMIT $14`,
    values: [...scopeValues(scope), group ?? null, ...(after ?? [null, null, null]), limit + 1],
  });
  return rows;
}
