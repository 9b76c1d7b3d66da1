import { randomUUID } from 'node:crypto';
import { occurrenceOn } from '@shared/scheduling/class-dates';
import type { Database } from '../../server/database/client';
import { classDates, classTemplates, enrollments } from '../../server/database/schema';
import { buildPatient, buildPatientWithAccount } from './people';

type NewTemplate = typeof classTemplates.$inferInsert;
type NewClassDate = typeof classDates.$inferInsert;
type NewEnrollment = typeof enrollments.$inferInsert;

async function one<T>(rows: PromiseLike<T[]>): Promise<T> {
  const [row] = await rows;
  if (!row) throw new Error('A builder made no row');
  return row;
}

interface BuiltSite {
  readonly id: string;
  readonly timeZone: string;
}

/** A class every day at nine, without dates. */
export const buildClass = (database: Database, site: BuiltSite, given: Partial<NewTemplate> = {}) =>
  one(
    database
      .insert(classTemplates)
      .values({
        siteId: site.id,
        name: `Class ${randomUUID().slice(0, 8)}`,
        recurrence: 'FREQ=DAILY',
        startsOn: '2026-01-01',
        localStart: '09:00',
        durationMinutes: 60,
        capacity: 12,
        monitoredPlaces: 12,
        ...given,
      })
      .returning(),
  );

export interface ClassDateOptions extends Partial<NewClassDate> {
  readonly localStart?: string;
  readonly durationMinutes?: number;
  readonly kind?: NewTemplate['kind'];
  readonly priceItemId?: string;
}

/** A class of its own with one date, 9:00 to 10:00 on 2026-12-07 unless told otherwise. */
export async function buildClassDate(
  database: Database,
  site: BuiltSite,
  given: ClassDateOptions = {},
) {
  const { localStart = '09:00', durationMinutes = 60, kind, priceItemId, ...columns } = given;
  const { localDate = '2026-12-07', capacity = 12 } = columns;
  const monitoredCapacity = columns.monitoredCapacity ?? capacity;
  const template = await buildClass(database, site, {
    ...(kind && { kind }),
    ...(priceItemId && { priceItemId }),
    startsOn: localDate,
    endsOn: localDate,
    localStart,
    durationMinutes,
    capacity,
    monitoredPlaces: Math.min(monitoredCapacity, capacity),
  });
  const times = occurrenceOn(localDate, { localStart, durationMinutes }, site.timeZone);
  return one(
    database
      .insert(classDates)
      .values({
        templateId: template.id,
        siteId: site.id,
        ...times,
        ...columns,
        capacity,
        monitoredCapacity,
      })
      .returning(),
  );
}

/** An active course of 36 sessions on monitored places, at most two a day. */
export const buildEnrollment = (
  database: Database,
  given: Partial<NewEnrollment> & { readonly patientId: string; readonly siteId: string },
) =>
  one(
    database
      .insert(enrollments)
      .values({
        qualifyingDiagnosis: 'heart-attack',
        qualifyingEventOn: '2026-10-20',
        payer: 'commercial',
        enrolledOn: '2026-11-10',
        ...given,
      })
      .returning(),
  );

/** A patient who may be booked. */
export async function buildBookable(
  database: Database,
  site: BuiltSite,
  given: Partial<NewEnrollment> = {},
) {
  const patient = await buildPatient(database, { siteId: site.id });
  const course = await buildEnrollment(database, {
    patientId: patient.id,
    siteId: site.id,
    ...given,
  });
  return { ...patient, enrollmentId: course.id };
}

/** A patient who may book, with the account that is theirs. */
export async function buildBooker(
  database: Database,
  site: BuiltSite,
  given: Partial<NewEnrollment> = {},
) {
  const { user, patient } = await buildPatientWithAccount(database, { siteId: site.id });
  await buildEnrollment(database, { patientId: patient.id, siteId: site.id, ...given });
  return { user, patient };
}
