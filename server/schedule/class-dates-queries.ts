import type { ClassDate } from '@shared/contracts/schedule-contract';
import { toWallTime } from '@shared/scheduling/wall-time';
import type { Transaction } from '../database/client';

type ClassDateRow = Omit<ClassDate, 'startsAt' | 'endsAt' | 'localStart' | 'price'> & {
  readonly startsAt: Date;
  readonly endsAt: Date;
  readonly timeZone: string;
  readonly priceName: string | null;
  readonly amountMinor: number | null;
  readonly currency: string | null;
};

const CLASS_DATE = `
  SELECT d.id, d.site_id AS "siteId", t.name, t.kind, d.starts_at AS "startsAt", d.ends_at AS "endsAt",
         d.local_date::text AS "localDate", s.time_zone AS "timeZone",
         d.capacity, d.booked, d.monitored_capacity AS "monitoredCapacity", d.monitored_booked AS "monitoredBooked",
         d.status, p.name AS "priceName", p.amount_minor::int AS "amountMinor", p.currency
    FROM class_dates d
    JOIN class_templates t ON t.id = d.template_id
    JOIN sites s ON s.id = d.site_id
    LEFT JOIN price_items p ON p.id = t.price_item_id`;

function present(found: ClassDateRow): ClassDate {
  const { priceName, amountMinor, currency, timeZone, ...row } = found;
  const priced = priceName !== null && amountMinor !== null && currency !== null;
  return {
    ...row,
    startsAt: row.startsAt.toISOString(),
    endsAt: row.endsAt.toISOString(),
    localStart: toWallTime(row.startsAt, timeZone).localTime,
    price: priced ? { name: priceName, amountMinor, currency } : null,
  };
}

/** A site's class dates by local date, `to` exclusive, earliest first. The instants only let the index narrow them. */
export async function listClassDates(
  tx: Transaction,
  span: { readonly siteId: string; readonly from: string; readonly to: string },
): Promise<ClassDate[]> {
  const { rows } = await tx.connection.query<ClassDateRow>({
    name: 'list-class-dates',
    text: `${CLASS_DATE}
     WHERE d.site_id = $1 AND d.local_date >= $2 AND d.local_date < $3
       AND d.starts_at BETWEEN $2::date - interval '2 days' AND $3::date + interval '2 days'
     ORDER BY d.starts_at, d.id`,
    values: [span.siteId, span.from, span.to],
  });
  return rows.map(present);
}

/** One class date, or null when there is none. */
export async function findClassDate(tx: Transaction, id: string): Promise<ClassDate | null> {
  const { rows } = await tx.connection.query<ClassDateRow>({
    name: 'find-class-date',
    text: `${CLASS_DATE} WHERE d.id = $1`,
    values: [id],
  });
  return rows[0] ? present(rows[0]) : null;
}
