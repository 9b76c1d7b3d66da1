import type { Occurrence } from '@shared/scheduling/class-dates';
import type { Transaction } from '../database/client';

/** A class with its site's zone, as class dates are made from it. */
export interface TemplateRow {
  readonly id: string;
  readonly siteId: string;
  readonly timeZone: string;
  readonly recurrence: string;
  readonly startsOn: string;
  readonly endsOn: string | null;
  /** HH:MM:SS at the site. */
  readonly localStart: string;
  readonly durationMinutes: number;
  readonly capacity: number;
  readonly monitoredPlaces: number;
}

/** A class date to come, as far as its plan may have to be changed. */
export interface FutureDateRow {
  readonly id: string;
  readonly localDate: string;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly booked: number;
  readonly status: 'scheduled' | 'closed' | 'cancelled';
}

const TEMPLATE = `
  SELECT t.id, t.site_id AS "siteId", s.time_zone AS "timeZone", t.recurrence, t.starts_on::text AS "startsOn",
         t.ends_on::text AS "endsOn", t.local_start::text AS "localStart", t.duration_minutes AS "durationMinutes",
         t.capacity, t.monitored_places AS "monitoredPlaces"
    FROM class_templates t JOIN sites s ON s.id = t.site_id`;

/** The classes of a site, in one order for all. */
export async function readTemplates(tx: Transaction, siteId: string): Promise<TemplateRow[]> {
  const { rows } = await tx.connection.query<TemplateRow>(
    `${TEMPLATE} WHERE t.site_id = $1 ORDER BY t.id`,
    [siteId],
  );
  return rows;
}

export async function readTemplate(tx: Transaction, id: string): Promise<TemplateRow | null> {
  const { rows } = await tx.connection.query<TemplateRow>(`${TEMPLATE} WHERE t.id = $1`, [id]);
  return rows[0] ?? null;
}

/** Whoever plans a site's classes (the daily job, an edit, a closure) waits here for the one before. */
export async function lockSitePlan(tx: Transaction, siteId: string): Promise<boolean> {
  const { rowCount } = await tx.connection.query(
    'SELECT FROM sites WHERE id = $1 FOR NO KEY UPDATE',
    [siteId],
  );
  return rowCount === 1;
}

export async function readClosedDates(
  tx: Transaction,
  siteId: string,
  from: string,
): Promise<Set<string>> {
  const { rows } = await tx.connection.query<{ localDate: string }>(
    'SELECT local_date::text AS "localDate" FROM closures WHERE site_id = $1 AND local_date >= $2',
    [siteId, from],
  );
  return new Set(rows.map(({ localDate }) => localDate));
}

/** @returns how many were new: those that there are stay as they are */
export async function insertClassDates(
  tx: Transaction,
  template: TemplateRow,
  made: readonly (Occurrence & { readonly id: string })[],
): Promise<number> {
  const { rowCount } = await tx.connection.query(
    `INSERT INTO class_dates (id, template_id, site_id, local_date, starts_at, ends_at, capacity, monitored_capacity)
     SELECT made.id, $1, $2, made.local_date, made.starts_at, made.ends_at, $3, $4
       FROM unnest($5::uuid[], $6::date[], $7::timestamptz[], $8::timestamptz[])
         AS made(id, local_date, starts_at, ends_at)
      ORDER BY made.local_date
     ON CONFLICT (template_id, local_date) DO NOTHING`,
    [
      template.id,
      template.siteId,
      template.capacity,
      template.monitoredPlaces,
      made.map(({ id }) => id),
      made.map(({ localDate }) => localDate),
      made.map(({ startsAt }) => startsAt),
      made.map(({ endsAt }) => endsAt),
    ],
  );
  return rowCount ?? 0;
}

/** The dates of a class that have not started, locked in the order in which every series locks them. */
export async function lockFutureDates(
  tx: Transaction,
  templateId: string,
  now: Date,
): Promise<FutureDateRow[]> {
  const { rows } = await tx.connection.query<FutureDateRow>(
    `SELECT id, local_date::text AS "localDate", starts_at AS "startsAt", ends_at AS "endsAt", booked, status
       FROM class_dates WHERE template_id = $1 AND starts_at > $2
      ORDER BY id FOR NO KEY UPDATE`,
    [templateId, now],
  );
  return rows;
}

/**
 * Moves class dates and the appointments in them to their newly computed instants.
 * @throws on constraint `appointments_no_overlap` when a patient would be in two classes at once
 */
export async function moveClassDates(
  tx: Transaction,
  moved: readonly (Occurrence & { readonly id: string })[],
): Promise<void> {
  const values = [
    moved.map(({ id }) => id),
    moved.map(({ startsAt }) => startsAt),
    moved.map(({ endsAt }) => endsAt),
  ];
  const times =
    'unnest($1::uuid[], $2::timestamptz[], $3::timestamptz[]) AS moved(id, starts_at, ends_at)';
  await tx.connection.query(
    `UPDATE class_dates d SET starts_at = moved.starts_at, ends_at = moved.ends_at, version = version + 1
       FROM ${times} WHERE d.id = moved.id`,
    values,
  );
  // Out of the way first: an hour on, a patient's nine o'clock would meet their ten o'clock, which moves too.
  await tx.connection.query(
    `UPDATE appointments SET starts_at = starts_at + interval '73048 days', ends_at = ends_at + interval '73048 days'
      WHERE class_date_id = ANY ($1::uuid[])`,
    [values[0]],
  );
  await tx.connection.query(
    `UPDATE appointments a SET starts_at = moved.starts_at, ends_at = moved.ends_at
       FROM ${times} WHERE a.class_date_id = moved.id`,
    values,
  );
}

/** Sets the places of dates to come, never below what is booked or monitored already. */
export async function resizeClassDates(
  tx: Transaction,
  ids: readonly string[],
  places: { readonly capacity: number; readonly monitoredPlaces: number },
): Promise<void> {
  await tx.connection.query(
    `UPDATE class_dates SET capacity = greatest($2, booked), monitored_capacity = greatest($3, monitored_booked),
            version = version + 1
      WHERE id = ANY ($1::uuid[])
        AND (capacity, monitored_capacity) IS DISTINCT FROM (greatest($2, booked), greatest($3, monitored_booked))`,
    [ids, places.capacity, places.monitoredPlaces],
  );
}

/** Takes dates out of the plan: removed when nobody was ever in them, else kept as cancelled. */
export async function withdrawClassDates(tx: Transaction, ids: readonly string[]): Promise<void> {
  await tx.connection.query(
    `DELETE FROM class_dates d WHERE d.id = ANY ($1::uuid[])
        AND NOT EXISTS (SELECT FROM appointments a WHERE a.class_date_id = d.id)`,
    [ids],
  );
  await tx.connection.query(
    `UPDATE class_dates SET status = 'cancelled', version = version + 1
      WHERE id = ANY ($1::uuid[]) AND status <> 'cancelled'`,
    [ids],
  );
}

/** Puts withdrawn dates back into the plan. */
export async function reopenClassDates(tx: Transaction, ids: readonly string[]): Promise<void> {
  await tx.connection.query(
    `UPDATE class_dates SET status = 'scheduled', version = version + 1
      WHERE id = ANY ($1::uuid[]) AND status = 'cancelled'`,
    [ids],
  );
}
