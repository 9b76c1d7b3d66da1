import type { HeldPlace, OfferedClass } from '@shared/scheduling/series-plan';
import type { Transaction } from '../database/client';

/** The course that a booking goes to, null when none is active. */
export interface CourseRow {
  readonly courseLeft: number;
  readonly dailyLimit: number;
  readonly monitored: boolean;
}

export async function readActiveCourse(
  tx: Transaction,
  patientId: string,
): Promise<CourseRow | null> {
  const { rows } = await tx.connection.query<CourseRow>({
    name: 'read-active-course',
    text: `
      SELECT session_limit - booked AS "courseLeft", daily_limit AS "dailyLimit", monitored
        FROM enrollments WHERE patient_id = $1 AND status = 'active' ORDER BY phase LIMIT 1`,
    values: [patientId],
  });
  return rows[0] ?? null;
}

/** The places that a patient holds on the local dates from `from` to `to`, both inclusive. */
export async function readHeldPlaces(
  tx: Transaction,
  patientId: string,
  span: { readonly from: string; readonly to: string },
): Promise<HeldPlace[]> {
  const { rows } = await tx.connection.query<HeldPlace>({
    name: 'read-held-places',
    text: `
      SELECT local_date::text AS "localDate", starts_at AS "startsAt", ends_at AS "endsAt"
        FROM appointments
       WHERE patient_id = $1 AND local_date BETWEEN $2 AND $3
         AND status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow')
       ORDER BY starts_at`,
    values: [patientId, span.from, span.to],
  });
  return rows;
}

/** A class date with what a series needs to know of it. */
export type OfferRow = Omit<OfferedClass, 'open' | 'localStart'> & {
  readonly scheduled: boolean;
  readonly timeZone: string;
  readonly exercise: boolean;
};

const OFFER = `
  d.id AS "classDateId", d.local_date::text AS "localDate", d.starts_at AS "startsAt", d.ends_at AS "endsAt",
  d.status = 'scheduled' AS scheduled,
  d.capacity - d.booked AS "placesLeft", d.monitored_capacity - d.monitored_booked AS "monitorsLeft",
  s.time_zone AS "timeZone", t.kind = 'exercise' AS exercise`;

const FROM = `
  FROM class_dates d
  JOIN class_templates t ON t.id = d.template_id
  JOIN sites s ON s.id = d.site_id`;

/** The exercise classes of a site on the local dates from `from` to `to`, both inclusive. */
export async function readOffers(
  tx: Transaction,
  siteId: string,
  span: { readonly from: string; readonly to: string },
): Promise<OfferRow[]> {
  const { rows } = await tx.connection.query<OfferRow>({
    name: 'read-offers',
    text: `
      SELECT ${OFFER} ${FROM}
       WHERE d.site_id = $1 AND d.local_date BETWEEN $2 AND $3 AND t.kind = 'exercise'
         AND d.starts_at BETWEEN $2::date - interval '2 days' AND $3::date + interval '2 days'
       ORDER BY d.starts_at, d.id`,
    values: [siteId, span.from, span.to],
  });
  return rows;
}

/** The class dates of a series, locked in one order for all, so that two series never wait for each other. */
export async function lockClassDates(tx: Transaction, ids: readonly string[]): Promise<OfferRow[]> {
  const { rows } = await tx.connection.query<OfferRow>({
    name: 'lock-class-dates',
    text: `
      SELECT ${OFFER} ${FROM}
       WHERE d.id = ANY ($1::uuid[]) ORDER BY d.id FOR NO KEY UPDATE OF d`,
    values: [ids],
  });
  return rows;
}

/** A site's zone, or null when there is no such site. */
export async function readTimeZone(tx: Transaction, siteId: string): Promise<string | null> {
  const { rows } = await tx.connection.query<{ timeZone: string }>({
    name: 'read-time-zone',
    text: 'SELECT time_zone AS "timeZone" FROM sites WHERE id = $1',
    values: [siteId],
  });
  return rows[0]?.timeZone ?? null;
}
