import type { DeskArrival, DeskClass, DeskSite, FreedPlace } from '@shared/contracts/desk-contract';
import { addDays, localDateAt, toInstant } from '@shared/scheduling/wall-time';
import type { Transaction } from '../database/client';

type Place = Omit<DeskSite, 'classes' | 'freed'>;

interface ClassRow extends Omit<DeskClass, 'startsAt' | 'endsAt' | 'arrivals'> {
  readonly startsAt: Date;
  readonly endsAt: Date;
}

interface ArrivalRow extends Omit<DeskArrival, 'due'> {
  readonly classDateId: string;
  readonly chargeId: string | null;
  readonly amountMinor: number | null;
  readonly currency: string | null;
}

interface FreedRow extends Omit<FreedPlace, 'cancelledAt' | 'startsAt'> {
  readonly cancelledAt: Date;
  readonly startsAt: Date;
}

const CLASSES = `
  SELECT d.id, t.name, d.starts_at AS "startsAt", d.ends_at AS "endsAt", d.capacity, d.booked, d.status
    FROM class_dates d JOIN class_templates t ON t.id = d.template_id
   WHERE d.site_id = $1 AND d.local_date = $2 AND d.starts_at BETWEEN $2::date - interval '2 days' AND $2::date + interval '2 days'
   ORDER BY d.starts_at, t.name, d.id`;

const ARRIVALS = `
  SELECT a.class_date_id AS "classDateId", a.id AS "appointmentId", p.id AS "patientId",
         p.given_name || ' ' || p.family_name AS "displayName", p.record_number AS "recordNumber", p.phone,
         a.status, a.version, c.id AS "chargeId", c.amount_minor::int AS "amountMinor", c.currency
    FROM appointments a
    JOIN patients p ON p.id = a.patient_id
    LEFT JOIN charges c ON c.appointment_id = a.id AND c.status = 'open'
   WHERE a.class_date_id = ANY ($1::uuid[]) AND a.status NOT IN ('cancelled', 'entered-in-error')
   ORDER BY p.family_name, p.given_name, a.id`;

const FREED = `
  SELECT a.id AS "appointmentId", p.id AS "patientId", p.given_name || ' ' || p.family_name AS "displayName",
         p.record_number AS "recordNumber", a.cancelled_at AS "cancelledAt", d.id AS "classDateId",
         t.name AS "className", d.starts_at AS "startsAt", d.local_date::text AS "localDate",
         d.capacity - d.booked AS free
    FROM appointments a
    JOIN class_dates d ON d.id = a.class_date_id
    JOIN class_templates t ON t.id = d.template_id
    JOIN patients p ON p.id = a.patient_id
   WHERE d.site_id = $1 AND d.status = 'scheduled' AND d.starts_at > $2
     AND a.status = 'cancelled' AND a.cancelled_at >= $3
   ORDER BY d.starts_at, p.family_name, p.given_name, a.id LIMIT 200`;

function presentArrival({ chargeId, amountMinor, currency, ...row }: ArrivalRow) {
  const isDue = chargeId !== null && amountMinor !== null && currency !== null;
  return { ...row, due: isDue ? { chargeId, amountMinor, currency } : null };
}

async function classesOf(tx: Transaction, { id, localDate }: Place): Promise<DeskClass[]> {
  const { connection } = tx;
  const { rows } = await connection.query<ClassRow>(CLASSES, [id, localDate]);
  const booked = await connection.query<ArrivalRow>(ARRIVALS, [rows.map((row) => row.id)]);
  const arrivals = booked.rows.map(presentArrival);
  return rows.map((row) => ({
    ...row,
    startsAt: row.startsAt.toISOString(),
    endsAt: row.endsAt.toISOString(),
    arrivals: arrivals
      .filter(({ classDateId }) => classDateId === row.id)
      .map(({ classDateId: _, ...arrival }) => arrival),
  }));
}

async function freedAt(tx: Transaction, place: Place, now: Date): Promise<FreedPlace[]> {
  const yesterday = addDays(place.localDate, -1);
  const since = toInstant({ localDate: yesterday, localTime: '00:00' }, place.timeZone);
  const { rows } = await tx.connection.query<FreedRow>(FREED, [place.id, now, since]);
  return rows.map((row) => ({
    ...row,
    cancelledAt: row.cancelledAt.toISOString(),
    startsAt: row.startsAt.toISOString(),
  }));
}

/** Today at each of these sites, by name: who is expected, and which places came free since the beginning of yesterday. */
export async function deskToday(
  tx: Transaction,
  siteIds: readonly string[],
  now: Date,
): Promise<DeskSite[]> {
  const { rows } = await tx.connection.query<Omit<Place, 'localDate'>>(
    'SELECT id, name, time_zone AS "timeZone" FROM sites WHERE id = ANY ($1::uuid[]) ORDER BY name',
    [siteIds],
  );
  const found: DeskSite[] = [];
  for (const row of rows) {
    const place = { ...row, localDate: localDateAt(now, row.timeZone) };
    const classes = await classesOf(tx, place);
    found.push({ ...place, classes, freed: await freedAt(tx, place, now) });
  }
  return found;
}
