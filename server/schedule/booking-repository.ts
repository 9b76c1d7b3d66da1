import type { Transaction } from '../database/client';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';

/** What of an appointment and its class the schedule tells others; instants as the driver reads them. */
export interface BookedRow {
  readonly id: string;
  readonly classDateId: string;
  readonly patientId: string;
  readonly enrollmentId: string;
  readonly status: AppointmentStatus;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly localDate: string;
  readonly version: number;
  readonly classStartsAt: Date;
  readonly className: string;
  readonly siteId: string;
  readonly timeZone: string;
  readonly priceItemId: string | null;
  readonly priceName: string | null;
  readonly amountMinor: number | null;
  readonly currency: string | null;
}

/** What decides about a booking, read after the database refused it. */
export interface DiagnosisRow {
  readonly scheduled: boolean;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly localDate: string;
  readonly timeZone: string;
  readonly placesLeft: number;
  readonly monitorsLeft: number;
  readonly courseActive: boolean;
  readonly courseLeft: number;
  readonly dayLeft: number;
  readonly needsMonitor: boolean;
  readonly overlapping: boolean;
}

/** Places of one patient are given one after another; taken before any class date's row. */
export async function lockPatientBooking(tx: Transaction, patientId: string): Promise<void> {
  await tx.connection.query({
    name: 'lock-patient-booking',
    text: 'SELECT lock_patient_booking($1)',
    values: [patientId],
  });
}

const INSERT = {
  name: 'book-appointments',
  text: `
    INSERT INTO appointments
      (id, class_date_id, patient_id, enrollment_id, monitored, local_date, starts_at, ends_at, created_by, created_at)
    SELECT asked.id, d.id, $3, e.id, e.monitored AND t.kind = 'exercise', d.local_date, d.starts_at, d.ends_at, $4, $5
      FROM unnest($1::uuid[], $2::uuid[]) AS asked(id, class_date_id)
      JOIN class_dates d ON d.id = asked.class_date_id
      JOIN class_templates t ON t.id = d.template_id
      JOIN LATERAL (
        SELECT id, monitored FROM enrollments WHERE patient_id = $3 AND status = 'active' ORDER BY phase LIMIT 1
      ) e ON true
     ORDER BY d.id`,
};

export interface NewAppointments {
  readonly ids: readonly string[];
  /** As many as ids, in the same order. */
  readonly classDateIds: readonly string[];
  readonly patientId: string;
  readonly createdBy: string;
  readonly at: Date;
}

/**
 * Takes the places; triggers count them and constraints refuse the one too many.
 * @returns how many were made: fewer than asked when there is no such class date or no active course
 */
export async function insertAppointments(tx: Transaction, rows: NewAppointments): Promise<number> {
  const { ids, classDateIds, patientId, createdBy, at } = rows;
  const inserted = await tx.connection.query({
    ...INSERT,
    values: [ids, classDateIds, patientId, createdBy, at],
  });
  return inserted.rowCount ?? 0;
}

const READ_BOOKED = {
  name: 'read-booked-appointments',
  text: `
    SELECT a.id, a.class_date_id AS "classDateId", a.patient_id AS "patientId", a.enrollment_id AS "enrollmentId",
           a.status, a.starts_at AS "startsAt", a.ends_at AS "endsAt", a.local_date::text AS "localDate", a.version,
           d.starts_at AS "classStartsAt", t.name AS "className", d.site_id AS "siteId", s.time_zone AS "timeZone",
           p.id AS "priceItemId", p.name AS "priceName", p.amount_minor::int AS "amountMinor", p.currency
      FROM appointments a
      JOIN class_dates d ON d.id = a.class_date_id
      JOIN class_templates t ON t.id = d.template_id
      JOIN sites s ON s.id = d.site_id
      LEFT JOIN price_items p ON p.id = t.price_item_id
     WHERE a.id = ANY ($1::uuid[])
     ORDER BY a.starts_at, a.id`,
};

/** Appointments with their classes, earliest first. */
export async function readBooked(tx: Transaction, ids: readonly string[]): Promise<BookedRow[]> {
  const { rows } = await tx.connection.query<BookedRow>({ ...READ_BOOKED, values: [ids] });
  return rows;
}

const DIAGNOSE = {
  name: 'diagnose-booking',
  text: `
    SELECT d.status = 'scheduled' AS scheduled, d.starts_at AS "startsAt", d.ends_at AS "endsAt",
           d.local_date::text AS "localDate", s.time_zone AS "timeZone",
           d.capacity - d.booked AS "placesLeft", d.monitored_capacity - d.monitored_booked AS "monitorsLeft",
           e.id IS NOT NULL AS "courseActive", coalesce(e.session_limit - e.booked, 0) AS "courseLeft",
           coalesce(e.daily_limit, 0) - coalesce(day.booked, 0) AS "dayLeft",
           coalesce(e.monitored AND t.kind = 'exercise', false) AS "needsMonitor",
           EXISTS (
             SELECT FROM appointments a
              WHERE a.patient_id = $2 AND a.during && d.during
                AND a.status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow')
           ) AS overlapping
      FROM class_dates d
      JOIN class_templates t ON t.id = d.template_id
      JOIN sites s ON s.id = d.site_id
      LEFT JOIN LATERAL (
        SELECT * FROM enrollments WHERE patient_id = $2 AND status = 'active' ORDER BY phase LIMIT 1
      ) e ON true
      LEFT JOIN patient_days day ON day.patient_id = $2 AND day.local_date = d.local_date
     WHERE d.id = $1`,
};

/** What stands between a patient and a class date now; undefined when there is no such class date. */
export async function diagnose(
  tx: Transaction,
  classDateId: string,
  patientId: string,
): Promise<DiagnosisRow | undefined> {
  const { rows } = await tx.connection.query<DiagnosisRow>({
    ...DIAGNOSE,
    values: [classDateId, patientId],
  });
  return rows[0];
}
