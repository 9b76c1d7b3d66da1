import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import type { Transaction } from '../database/client';
import { appointments, classDates, patients, payments, sites, users } from '../database/schema';

/** Who a message to a patient goes to, and where it comes from. */
export async function findPatientRecipient(tx: Transaction, patientId: string) {
  const [row] = await tx
    .select({
      id: patients.id,
      firstName: patients.givenName,
      email: sql<string | null>`coalesce(${patients.email}, ${users.email})`,
      userId: patients.userId,
      timeZone: sql<string>`coalesce(${patients.timeZone}, ${sites.timeZone})`,
      phone: sites.phone,
    })
    .from(patients)
    .innerJoin(sites, eq(sites.id, patients.siteId))
    .leftJoin(users, eq(users.id, patients.userId))
    .where(eq(patients.id, patientId));
  return row;
}
export type PatientRecipient = NonNullable<Awaited<ReturnType<typeof findPatientRecipient>>>;

/** These of a patient's appointments, earliest first. */
export function readBookings(tx: Transaction, patientId: string, ids: readonly string[]) {
  return tx
    .select({
      status: appointments.status,
      startsAt: appointments.startsAt,
      endsAt: appointments.endsAt,
      cancelledBy: appointments.cancelledBy,
      timeZone: sites.timeZone,
      address: sites.address,
      phone: sites.phone,
    })
    .from(appointments)
    .innerJoin(classDates, eq(classDates.id, appointments.classDateId))
    .innerJoin(sites, eq(sites.id, classDates.siteId))
    .where(and(eq(appointments.patientId, patientId), inArray(appointments.id, [...ids])))
    .orderBy(asc(appointments.startsAt));
}
export type Booking = Awaited<ReturnType<typeof readBookings>>[number];

export async function findReceived(tx: Transaction, paymentId: string) {
  const [row] = await tx
    .select()
    .from(payments)
    .where(and(eq(payments.id, paymentId), eq(payments.status, 'settled')));
  return row;
}

/** The zone in which staff are told times: of their first site, else of the program's. */
export async function zoneForUser(tx: Transaction, userId: string): Promise<string> {
  const { rows } = await tx.connection.query<{ timeZone: string }>(
    `SELECT s.time_zone AS "timeZone" FROM sites s LEFT JOIN user_sites u ON u.site_id = s.id AND u.user_id = $1
      ORDER BY u.user_id IS NULL, s.created_at, s.id LIMIT 1`,
    [userId],
  );
  return rows[0]?.timeZone ?? 'UTC';
}
