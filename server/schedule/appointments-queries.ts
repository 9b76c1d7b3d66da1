import type {
  AppointmentItem,
  AppointmentsQuery,
  ClassAppointment,
} from '@shared/contracts/schedule-contract';
import type { Transaction } from '../database/client';

type Times = 'startsAt' | 'endsAt';

type ItemRow = Omit<AppointmentItem, Times | 'price' | 'charge' | 'site'> & {
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly siteId: string;
  readonly siteName: string;
  readonly timeZone: string;
  readonly phone: string;
  readonly priceName: string | null;
  readonly amountMinor: number | null;
  readonly currency: string | null;
  readonly chargedMinor: number | null;
  readonly chargedIn: string | null;
  readonly chargeStatus: string | null;
};

const ITEM = `
  SELECT a.id, a.class_date_id AS "classDateId", a.patient_id AS "patientId", a.status, a.version,
         a.starts_at AS "startsAt", a.ends_at AS "endsAt", a.local_date::text AS "localDate", a.monitored,
         a.cancelled_reason AS "cancelledReason", t.name AS "className", t.kind,
         s.id AS "siteId", s.name AS "siteName", s.time_zone AS "timeZone", s.phone,
         p.name AS "priceName", p.amount_minor::int AS "amountMinor", p.currency,
         c.amount_minor::int AS "chargedMinor", c.currency AS "chargedIn", c.status AS "chargeStatus"
    FROM appointments a
    JOIN class_dates d ON d.id = a.class_date_id
    JOIN class_templates t ON t.id = d.template_id
    JOIN sites s ON s.id = d.site_id
    LEFT JOIN price_items p ON p.id = t.price_item_id
    LEFT JOIN charges c ON c.appointment_id = a.id AND c.status IN ('open', 'paid')
      AND NOT EXISTS (SELECT FROM refunds r JOIN payments y ON y.id = r.payment_id WHERE y.charge_id = c.id)`;

function presentItem(row: ItemRow): AppointmentItem {
  const { siteId, siteName, timeZone, phone, priceName, amountMinor, currency, ...more } = row;
  const { chargedMinor, chargedIn, chargeStatus, ...rest } = more;
  const charged = chargedMinor !== null && chargedIn !== null;
  const priced = priceName !== null && amountMinor !== null && currency !== null;
  return {
    ...rest,
    startsAt: row.startsAt.toISOString(),
    endsAt: row.endsAt.toISOString(),
    price: priced ? { name: priceName, amountMinor, currency } : null,
    charge: charged
      ? { amountMinor: chargedMinor, currency: chargedIn, paid: chargeStatus === 'paid' }
      : null,
    site: { id: siteId, name: siteName, timeZone, phone },
  };
}

/** Where a page of appointments ended. */
export interface AppointmentsPosition {
  readonly startsAt: Date;
  readonly id: string;
}

export type AppointmentsAsk = Pick<AppointmentsQuery, 'from' | 'to' | 'order' | 'limit'> & {
  readonly after: AppointmentsPosition | null;
};

/** A patient's appointments by start, those struck out left out; one more than `limit` when there are more. */
export async function listPatientAppointments(
  tx: Transaction,
  patientId: string,
  ask: AppointmentsAsk,
): Promise<AppointmentItem[]> {
  const latestFirst = ask.order === 'latest-first';
  const direction = latestFirst ? 'DESC' : 'ASC';
  const { rows } = await tx.connection.query<ItemRow>({
    name: `list-patient-appointments-${direction}`,
    text: `${ITEM}
      WHERE a.patient_id = $1 AND a.status <> 'entered-in-error'
        AND ($2::date IS NULL OR a.local_date >= $2) AND ($3::date IS NULL OR a.local_date < $3)
        AND ($4::timestamptz IS NULL OR (a.starts_at, a.id) ${latestFirst ? '<' : '>'} ($4, $5::uuid))
      ORDER BY a.starts_at ${direction}, a.id ${direction}
      LIMIT $6`,
    values: [
      patientId,
      ask.from ?? null,
      ask.to ?? null,
      ask.after?.startsAt ?? null,
      ask.after?.id ?? null,
      ask.limit + 1,
    ],
  });
  return rows.map(presentItem);
}

type ClassAppointmentRow = Omit<ClassAppointment, Times> & {
  readonly startsAt: Date;
  readonly endsAt: Date;
};

/**
 * Who is in a class and who cancelled, by family name; those struck out left out.
 * @param siteIds only patients of these sites, whose records the caller may open
 */
export async function listClassAppointments(
  tx: Transaction,
  classDateId: string,
  siteIds: readonly string[],
): Promise<ClassAppointment[]> {
  const { rows } = await tx.connection.query<ClassAppointmentRow>({
    name: 'list-class-appointments',
    text: `
      SELECT a.id, a.class_date_id AS "classDateId", a.patient_id AS "patientId", a.status, a.version,
             a.starts_at AS "startsAt", a.ends_at AS "endsAt", a.monitored, a.cancelled_reason AS "cancelledReason",
             p.given_name || ' ' || p.family_name AS "displayName", p.record_number AS "recordNumber"
        FROM appointments a
        JOIN patients p ON p.id = a.patient_id
       WHERE a.class_date_id = $1 AND a.status <> 'entered-in-error' AND p.site_id = ANY ($2::uuid[])
       ORDER BY p.family_name, p.given_name, p.id, a.id`,
    values: [classDateId, siteIds],
  });
  return rows.map((row) => ({
    ...row,
    startsAt: row.startsAt.toISOString(),
    endsAt: row.endsAt.toISOString(),
  }));
}

/** Whose appointment it is, or null when there is none. */
export async function findAppointmentPatient(
  tx: Transaction,
  appointmentId: string,
): Promise<string | null> {
  const { rows } = await tx.connection.query<{ patientId: string }>({
    name: 'find-appointment-patient',
    text: 'SELECT patient_id AS "patientId" FROM appointments WHERE id = $1',
    values: [appointmentId],
  });
  return rows[0]?.patientId ?? null;
}
