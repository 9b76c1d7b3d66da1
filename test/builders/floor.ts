import { eq } from 'drizzle-orm';
import { v7 as uuidv7 } from 'uuid';
import type { Database } from '../../server/database/client';
import { appointments, sessionRecords, vitalSigns } from '../../server/database/schema';
import { buildUser } from './people';
import { buildPrescription } from './prescriptions';
import { buildBookable } from './schedule';

type Status = (typeof appointments.$inferInsert)['status'];

interface DatedClass {
  readonly id: string;
  readonly siteId: string;
  readonly localDate: string;
  readonly startsAt: Date;
  readonly endsAt: Date;
}

export interface VisitOptions {
  readonly status?: Status;
  /** False for a patient without a range. */
  readonly range?: boolean | Partial<Parameters<typeof buildPrescription>[1]>;
}

/** A patient in a class, checked in and with the worked example in force unless told otherwise. */
export async function buildVisit(
  database: Database,
  site: { readonly id: string; readonly timeZone: string },
  classDate: DatedClass,
  { status = 'checked-in', range = true }: VisitOptions = {},
) {
  const patient = await buildBookable(database, site);
  const staff = await buildUser(database, { roles: ['front-desk'] });
  const { enrollmentId } = patient;
  const [appointment] = await database
    .insert(appointments)
    .values({
      patientId: patient.id,
      enrollmentId,
      classDateId: classDate.id,
      localDate: classDate.localDate,
      startsAt: classDate.startsAt,
      endsAt: classDate.endsAt,
      createdBy: staff.id,
      monitored: true,
    })
    .returning();
  if (!appointment) throw new Error('A builder made no row');
  if (status !== 'booked') {
    await database.update(appointments).set({ status }).where(eq(appointments.id, appointment.id));
  }
  const prescription = range
    ? await buildPrescription(database, {
        ...(typeof range === 'object' && range),
        patientId: patient.id,
        enrollmentId,
      })
    : null;
  return { patient, appointment, prescription };
}

/** A record as a page would begin it. */
export const recordBody = (appointmentId: string, startedAt = '2026-12-01T14:00:00.000Z') => ({
  appointmentId,
  startedAt,
});

/** A reading at exercise, in the worked example's range of 91 to 108. */
export const readingBody = (sessionRecordId: string, given: object = {}) => ({
  sessionRecordId,
  phase: 'exercise',
  measuredAt: '2026-12-01T14:10:00.000Z',
  heartRate: 100,
  ...given,
});

/** A record with one reading, made past the API. */
export async function buildSessionRecord(
  database: Database,
  visit: {
    readonly appointmentId: string;
    readonly patientId: string;
    readonly recordedBy: string;
  },
) {
  const { patientId, recordedBy } = visit;
  const startedAt = new Date('2026-12-01T14:00:00Z');
  const [record] = await database
    .insert(sessionRecords)
    .values({ id: uuidv7(), startedAt, ...visit })
    .returning();
  if (!record) throw new Error('A builder made no row');
  const [reading] = await database
    .insert(vitalSigns)
    .values({
      id: uuidv7(),
      sessionRecordId: record.id,
      patientId,
      recordedBy,
      phase: 'exercise',
      measuredAt: startedAt,
      heartRate: 100,
    })
    .returning();
  if (!reading) throw new Error('A builder made no row');
  return { record, reading };
}
