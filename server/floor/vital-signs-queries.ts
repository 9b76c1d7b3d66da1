import { and, asc, desc, eq, gte, inArray, isNotNull, notInArray, sql } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import type { VitalReading, VitalsSession } from '@shared/contracts/vitals-history-contract';
import type { Queryable } from '../database/client';
import {
  appointments,
  classDates,
  sessionRecords,
  sites,
  users,
  vitalSigns,
} from '../database/schema';

export interface SteadyReading {
  readonly sessionRecordId: string;
  readonly localDate: string;
  readonly heartRate: number;
  readonly perceivedExertion: number;
}

/**
 * Readings at exercise with a rate and an effort, of signed sessions from a local date on; of an amended reading the
 * amendment alone.
 */
export async function steadyExerciseReadings(
  db: Queryable,
  patientId: string,
  from: string,
): Promise<SteadyReading[]> {
  const rows = await db
    .select({
      sessionRecordId: vitalSigns.sessionRecordId,
      localDate: appointments.localDate,
      heartRate: vitalSigns.heartRate,
      perceivedExertion: vitalSigns.perceivedExertion,
    })
    .from(vitalSigns)
    .innerJoin(sessionRecords, eq(sessionRecords.id, vitalSigns.sessionRecordId))
    .innerJoin(appointments, eq(appointments.id, sessionRecords.appointmentId))
    .where(
      and(
        eq(vitalSigns.patientId, patientId),
        eq(vitalSigns.phase, 'exercise'),
        notInArray(vitalSigns.status, ['amended', 'entered-in-error']),
        isNotNull(sessionRecords.signedAt),
        gte(appointments.localDate, from),
      ),
    )
    .orderBy(asc(vitalSigns.measuredAt), asc(vitalSigns.id));
  return rows.flatMap(({ heartRate, perceivedExertion, ...session }) =>
    heartRate === null || perceivedExertion === null
      ? []
      : [{ ...session, heartRate, perceivedExertion }],
  );
}

interface SessionPage {
  /** The last session of the page before, null for the first page. */
  readonly after: { readonly startedAt: Date; readonly id: string } | null;
  readonly limit: number;
}

const signer = alias(users, 'signer');

async function readingsOf(
  db: Queryable,
  sessionIds: string[],
): Promise<Map<string, VitalReading[]>> {
  const rows =
    sessionIds.length === 0
      ? []
      : await db
          .select({ reading: vitalSigns, recordedBy: users.displayName })
          .from(vitalSigns)
          .innerJoin(users, eq(users.id, vitalSigns.recordedBy))
          .where(inArray(vitalSigns.sessionRecordId, sessionIds))
          .orderBy(asc(vitalSigns.measuredAt), asc(vitalSigns.receivedAt), asc(vitalSigns.id));
  const bySession = new Map<string, VitalReading[]>();
  for (const { reading, recordedBy } of rows) {
    const {
      sessionRecordId,
      patientId: _patient,
      prescriptionId: _range,
      receivedAt: _at,
      ...values
    } = reading;
    const readings = bySession.get(sessionRecordId) ?? [];
    readings.push({ ...values, measuredAt: values.measuredAt.toISOString(), recordedBy });
    bySession.set(sessionRecordId, readings);
  }
  return bySession;
}

/** A patient's sessions with all readings, the newest session first; one more than `limit` tells that there are more. */
export async function vitalsHistory(
  db: Queryable,
  patientId: string,
  { after, limit }: SessionPage,
): Promise<VitalsSession[]> {
  const sessions = await db
    .select({
      sessionRecordId: sessionRecords.id,
      startedAt: sessionRecords.startedAt,
      signedAt: sessionRecords.signedAt,
      signedBy: signer.displayName,
      localDate: appointments.localDate,
      timeZone: sites.timeZone,
    })
    .from(sessionRecords)
    .innerJoin(appointments, eq(appointments.id, sessionRecords.appointmentId))
    .innerJoin(classDates, eq(classDates.id, appointments.classDateId))
    .innerJoin(sites, eq(sites.id, classDates.siteId))
    .leftJoin(signer, eq(signer.id, sessionRecords.signedBy))
    .where(
      and(
        eq(sessionRecords.patientId, patientId),
        after
          ? sql`(${sessionRecords.startedAt}, ${sessionRecords.id}) < (${after.startedAt.toISOString()}::timestamptz, ${after.id}::uuid)`
          : undefined,
      ),
    )
    .orderBy(desc(sessionRecords.startedAt), desc(sessionRecords.id))
    .limit(limit + 1);
  const readings = await readingsOf(
    db,
    sessions.map(({ sessionRecordId }) => sessionRecordId),
  );
  return sessions.map((session) => ({
    ...session,
    startedAt: session.startedAt.toISOString(),
    signedAt: session.signedAt?.toISOString() ?? null,
    readings: readings.get(session.sessionRecordId) ?? [],
  }));
}
