import { and, desc, eq, sql } from 'drizzle-orm';
import type { PrescribingInputs } from '@shared/contracts/prescribing-inputs-contract';
import { addDays } from '@shared/scheduling/wall-time';
import type { Queryable } from '../database/client';
import { enrollments, patients } from '../database/schema';
import { steadyExerciseReadings } from '../floor/vital-signs-queries';
import { deriveInputs } from './prescribing/derive-inputs';
import { withoutErrors } from './prescribing/record-facts';
import { patientRecord } from './record-queries';

/** How far back readings are looked at, days. */
const readingDays = 90;

/**
 * What a prescription would rest on today.
 * @param today the site's local date, YYYY-MM-DD
 * @param testValidDays after how many days a test no longer counts, by the policy
 * @returns undefined when there is no such patient
 */
export async function prescribingInputs(
  tx: Queryable,
  patientId: string,
  today: string,
  testValidDays: number,
): Promise<PrescribingInputs | undefined> {
  const [found] = await tx
    .select({
      birthDate: patients.birthDate,
      sexAtBirth: patients.sexAtBirth,
      firstSessionOn: enrollments.firstSessionOn,
      qualifyingDiagnosis: enrollments.qualifyingDiagnosis,
    })
    .from(patients)
    .leftJoin(enrollments, eq(enrollments.patientId, patients.id))
    .where(and(eq(patients.id, patientId)))
    .orderBy(
      desc(sql`${enrollments.status} IN ('active', 'on-hold')`),
      desc(enrollments.enrolledOn),
    )
    .limit(1);
  if (!found) return undefined;
  const record = await patientRecord(tx, patientId);
  const readings = await steadyExerciseReadings(tx, patientId, addDays(today, -readingDays));
  const { birthDate, sexAtBirth, firstSessionOn, qualifyingDiagnosis } = found;
  return deriveInputs(
    {
      patient: { birthDate, sexAtBirth },
      course: qualifyingDiagnosis === null ? null : { firstSessionOn, qualifyingDiagnosis },
      record: withoutErrors(record),
      readings,
      testValidDays,
    },
    today,
  );
}
