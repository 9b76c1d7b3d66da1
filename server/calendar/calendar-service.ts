import ical, { ICalCalendarMethod, ICalEventStatus } from 'ical-generator';
import type { Transaction } from '../database/client';
import { hashOfToken, newToken } from '../http/secret-token';

/**
 * Makes the patient's calendar address anew, of which only the hash is kept; the former one ends.
 * @returns the secret that stands in it
 */
export async function renewCalendarToken(
  tx: Transaction,
  patientId: string,
  now: Date,
): Promise<string> {
  const token = newToken();
  await tx.connection.query(
    `INSERT INTO calendar_links (patient_id, token_hash, created_at) VALUES ($1, $2, $3)
     ON CONFLICT (patient_id) DO UPDATE SET token_hash = excluded.token_hash, created_at = excluded.created_at`,
    [patientId, hashOfToken(token), now],
  );
  return token;
}

/** When the patient's calendar address was made; null while there is none. */
export async function calendarMadeAt(tx: Transaction, patientId: string): Promise<Date | null> {
  const { rows } = await tx.connection.query<{ createdAt: Date }>(
    'SELECT created_at AS "createdAt" FROM calendar_links WHERE patient_id = $1',
    [patientId],
  );
  return rows[0]?.createdAt ?? null;
}

/** @returns undefined when the address was never given out, or was made anew since */
export async function patientOfCalendar(
  tx: Transaction,
  token: string,
): Promise<string | undefined> {
  const { rows } = await tx.connection.query<{ patientId: string }>(
    'SELECT patient_id AS "patientId" FROM calendar_links WHERE token_hash = $1',
    [hashOfToken(token)],
  );
  return rows[0]?.patientId;
}

export interface CalendarEntry {
  readonly id: string;
  readonly version: number;
  readonly cancelled: boolean;
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly createdAt: Date;
  readonly address: string;
}

const DAY = 24 * 3_600_000;
/** Older ones are in the calendar already, and stay there. */
const BACK_MS = 62 * DAY;

/** A patient's appointments of the last two months and all that come, those cancelled too. */
export async function calendarEntries(
  tx: Transaction,
  patientId: string,
  now: Date,
): Promise<CalendarEntry[]> {
  const { rows } = await tx.connection.query<CalendarEntry>(
    `SELECT a.id, a.version, a.status IN ('cancelled', 'entered-in-error') AS cancelled, a.starts_at AS "startsAt",
            a.ends_at AS "endsAt", a.created_at AS "createdAt", s.address
       FROM appointments a JOIN class_dates d ON d.id = a.class_date_id JOIN sites s ON s.id = d.site_id
      WHERE a.patient_id = $1 AND a.starts_at >= $2 AND a.status NOT IN ('proposed', 'pending', 'waitlist')
      ORDER BY a.starts_at, a.id`,
    [patientId, new Date(now.getTime() - BACK_MS)],
  );
  return rows;
}

/**
 * Appointments as a calendar by RFC 5545. Each keeps its UID, and its SEQUENCE counts its changes (section 3.8.7.4), so that a
 * calendar program follows. Titles are neutral: others may see the calendar.
 * @param host what makes the UIDs the program's own
 */
export function calendarOf(entries: readonly CalendarEntry[], host: string): string {
  const calendar = ical({
    name: 'Appointments',
    prodId: { company: 'Plimsoll', product: 'Appointments', language: 'EN' },
    method: ICalCalendarMethod.PUBLISH,
    ttl: 3600,
  });
  for (const { id, version, cancelled, startsAt, endsAt, createdAt, address } of entries) {
    calendar.createEvent({
      id: `${id}@${host}`,
      sequence: version - 1,
      start: startsAt,
      end: endsAt,
      stamp: createdAt,
      summary: 'Appointment',
      location: address,
      status: cancelled ? ICalEventStatus.CANCELLED : ICalEventStatus.CONFIRMED,
    });
  }
  return calendar.toString();
}
