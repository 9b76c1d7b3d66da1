import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import type { FollowUp } from '@shared/contracts/follow-ups-contract';
import { openRecords } from '../accounts/access-policy';
import type { Actor } from '../accounts/actor';
import type { Queryable } from '../database/client';
import { patients, questionnaireAnswers as answered, sites, users } from '../database/schema';

const atMost = 100;

/** Open follow-ups of the records that are open to somebody, the longest waiting first. */
export async function openFollowUps(db: Queryable, actor: Actor): Promise<FollowUp[]> {
  const rows = await db
    .select({
      id: answered.id,
      patientId: patients.id,
      displayName: sql<string>`${patients.givenName} || ' ' || ${patients.familyName}`,
      recordNumber: patients.recordNumber,
      phone: patients.phone,
      siteName: sites.name,
      timeZone: sites.timeZone,
      answeredOn: answered.answeredOn,
      answer: sql<number>`(${answered.answers} ->> 8)::int`,
      recordedAt: answered.recordedAt,
      recordedBy: users.displayName,
    })
    .from(answered)
    .innerJoin(patients, eq(patients.id, answered.patientId))
    .innerJoin(sites, eq(sites.id, patients.siteId))
    .innerJoin(users, eq(users.id, answered.recordedBy))
    .where(
      and(
        answered.selfHarm,
        isNull(answered.endedAt),
        isNull(answered.enteredInErrorAt),
        openRecords(actor),
      ),
    )
    .orderBy(asc(answered.recordedAt))
    .limit(atMost);
  return rows.map(({ id, patientId, displayName, recordNumber, phone, ...row }) => ({
    id,
    patient: {
      id: patientId,
      displayName,
      recordNumber,
      phone,
      site: { name: row.siteName, timeZone: row.timeZone },
    },
    answeredOn: row.answeredOn,
    answer: row.answer,
    recordedAt: row.recordedAt.toISOString(),
    recordedBy: row.recordedBy,
  }));
}
