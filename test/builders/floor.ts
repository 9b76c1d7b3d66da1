import { eq } from 'drizzle-orm';
import { v7 as uuidv7 } from 'uuid';
import type { Database } from '../../server/database/client';
import {
  appointments,
  progressionProposals,
  sessionRecords,
  vitalSigns,
} from '../../server/database/schema';
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

/** A place in a class for someone who is there already. */
export async function buildAppointment(
  database: Database,
  {
    classDate,
    status = 'booked',
    ...whose
  }: {
    readonly patientId: string;
    readonly enrollmentId: string;
    readonly classDate: DatedClass;
    readonly status?: Status;
  },
) {
  const staff = await buildUser(database, { roles: ['front-desk'] });
  const [appointment] = await database
    .insert(appointments)
    .values({
      ...whose,
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
  return appointment;
}

/** A patient in a class, checked in and with the worked example in force unless told otherwise. */
export async function buildVisit(
  database: Database,
  site: { readonly id: string; readonly timeZone: string },
  classDate: DatedClass,
  { status = 'checked-in', range = true }: VisitOptions = {},
) {
  const patient = await buildBookable(database, site);
  const { enrollmentId } = patient;
  const appointment = await buildAppointment(database, {
    patientId: patient.id,
    enrollmentId,
    classDate,
    status,
  });
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

/** How a treadmill was set, as a page would send it. */
export const boutBody = (sessionRecordId: string, given: object = {}) => ({
  sessionRecordId,
  setting: { modality: 'treadmill-walk', speedMph: 2.8, gradePercent: 0 },
  minutes: 30,
  ...given,
});

/** A next step that nobody has decided on yet, made past the API. */
export async function buildProposal(
  database: Database,
  of: { readonly record: string; readonly patientId: string; readonly prescriptionId: string },
): Promise<string> {
  const [made] = await database
    .insert(progressionProposals)
    .values({
      sessionRecordId: of.record,
      patientId: of.patientId,
      prescriptionId: of.prescriptionId,
      proposal: { action: 'hold', reasons: [], from: null, to: null },
      policyVersion: 1,
      engineVersion: '1.0.0',
    })
    .returning();
  if (!made) throw new Error('A builder made no row');
  return made.id;
}

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
