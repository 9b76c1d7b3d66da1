import { and, desc, eq, sql } from 'drizzle-orm';
import { localDateAt } from '@shared/scheduling/wall-time';
import type { Queryable } from '../database/client';
import { enrollments, patients, riskStratifications, sites, users } from '../database/schema';
import { fail } from '../http/failure';

const siteColumns = { id: sites.id, name: sites.name, timeZone: sites.timeZone };

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
