import { and, asc, desc, eq, sql, type SQL } from 'drizzle-orm';
import { localDateAt } from '@shared/scheduling/wall-time';
import type { Queryable } from '../database/client';
import { enrollments, patients, riskStratifications, sites, users } from '../database/schema';
import { fail } from '../http/failure';
import type { NamePosition } from './patient-cursor';

const siteColumns = { id: sites.id, name: sites.name, timeZone: sites.timeZone };

/** The course that runs, else the last one; in a lateral join a list of any length stays one statement. */
const latestCourse = (db: Queryable) =>
  db
    .select({
      enrollmentId: enrollments.id,
      status: enrollments.status,
      attended: enrollments.attended,
      planned: enrollments.plannedSessions,
    })
    .from(enrollments)
    .where(eq(enrollments.patientId, patients.id))
    .orderBy(
      desc(sql`${enrollments.status} IN ('active', 'on-hold')`),
      desc(enrollments.enrolledOn),
      desc(enrollments.id),
    )
    .limit(1)
    .as('course');

interface Search {
  readonly q: string | undefined;
  readonly after: NamePosition | null;
  readonly limit: number;
}

/** Words that hold nothing to search by find nobody; no words at all find everybody. */
const matches = (q: string | undefined): SQL | undefined =>
  q === undefined || q.trim() === ''
    ? undefined
    : sql`${patients.searchTerms} @@ patient_search_query(${q})`;

const isAfter = (after: NamePosition | null): SQL | undefined =>
  after === null
    ? undefined
    : sql`(${patients.familyName}, ${patients.givenName}, ${patients.id}) > (${after.familyName}, ${after.givenName}, ${after.id}::uuid)`;

/**
 * A page of patients by family name, given name and id, as people sort names.
 * @param open which records the caller may open, as a condition on `patients`
 * @returns one row more than `limit` when there are more
 */
export function searchPatients(db: Queryable, open: SQL, { q, after, limit }: Search) {
  const course = latestCourse(db);
  return db
    .select({
      id: patients.id,
      familyName: patients.familyName,
      givenName: patients.givenName,
      recordNumber: patients.recordNumber,
      birthDate: patients.birthDate,
      site: siteColumns,
      course: {
        enrollmentId: course.enrollmentId,
        status: course.status,
        attended: course.attended,
        planned: course.planned,
      },
    })
    .from(patients)
    .innerJoin(sites, eq(sites.id, patients.siteId))
    .leftJoinLateral(course, sql`true`)
    .where(and(open, matches(q), isAfter(after)))
    .orderBy(asc(patients.familyName), asc(patients.givenName), asc(patients.id))
    .limit(limit + 1);
}

export type FoundPatient = Awaited<ReturnType<typeof searchPatients>>[number];

/** A patient with the site and the account; undefined when there is none. */
export async function patientById(db: Queryable, patientId: string) {
  const [found] = await db
    .select({
      patient: patients,
      site: siteColumns,
      hasPassword: sql<boolean | null>`${users.passwordHash} IS NOT NULL`,
    })
    .from(patients)
    .innerJoin(sites, eq(sites.id, patients.siteId))
    .leftJoin(users, eq(users.id, patients.userId))
    .where(eq(patients.id, patientId));
  return found;
}

export type PatientWithSite = NonNullable<Awaited<ReturnType<typeof patientById>>>;

/** A patient's courses, the newest first, each with its number. */
export function coursesOf(db: Queryable, patientId: string) {
  return db
    .select({
      enrollment: enrollments,
      site: siteColumns,
      number: sql<number>`row_number() OVER (ORDER BY ${enrollments.enrolledOn}, ${enrollments.id})::int`,
    })
    .from(enrollments)
    .innerJoin(sites, eq(sites.id, enrollments.siteId))
    .where(eq(enrollments.patientId, patientId))
    .orderBy(desc(enrollments.enrolledOn), desc(enrollments.id));
}

export type CourseWithSite = Awaited<ReturnType<typeof coursesOf>>[number];

/** The last stratification of risk, undefined before the first. */
export async function latestRisk(db: Queryable, patientId: string) {
  const [risk] = await db
    .select({ level: riskStratifications.level, assessedOn: riskStratifications.assessedOn })
    .from(riskStratifications)
    .where(
      and(
        eq(riskStratifications.patientId, patientId),
        sql`${riskStratifications.enteredInErrorAt} IS NULL`,
      ),
    )
    .orderBy(desc(riskStratifications.assessedOn), desc(riskStratifications.recordedAt))
    .limit(1);
  return risk;
}

/**
 * What dates of a patient's record are held against: today at the site, and the birth; both YYYY-MM-DD.
 * @throws Failure `not-found` when there is no such patient
 */
export async function patientDates(db: Queryable, patientId: string, now: Date) {
  const [found] = await db
    .select({ birthDate: patients.birthDate, timeZone: sites.timeZone })
    .from(patients)
    .innerJoin(sites, eq(sites.id, patients.siteId))
    .where(eq(patients.id, patientId));
  if (!found) throw fail('not-found');
  return { birthDate: found.birthDate, today: localDateAt(now, found.timeZone) };
}
