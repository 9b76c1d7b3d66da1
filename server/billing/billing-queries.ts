import { and, desc, eq, inArray, lt, or, sql, type SQL } from 'drizzle-orm';
import type { Charge, StaffCharge } from '@shared/contracts/billing-contract';
import { atOwnSites } from '../accounts/access-policy';
import type { Actor } from '../accounts/actor';
import type { Queryable } from '../database/client';
import { matchesSearch } from '../patients/patient-search-queries';
import {
  appointments,
  charges,
  classDates,
  patients,
  payments,
  priceItems,
  refunds,
  sites,
} from '../database/schema';

const latestPayment = <T>(column: SQL) => sql<T>`(
  SELECT ${column} FROM ${payments} WHERE ${payments.chargeId} = ${charges.id}
  ORDER BY ${payments.status} = 'settled' DESC, ${payments.createdAt} DESC LIMIT 1)`;

const refundStatus = sql<Charge['refund']>`(
  SELECT ${refunds.status} FROM ${refunds} JOIN ${payments} ON ${payments.id} = ${refunds.paymentId}
  WHERE ${payments.chargeId} = ${charges.id} ORDER BY ${refunds.createdAt} DESC LIMIT 1)`;

function selectCharges(tx: Queryable) {
  return tx
    .select({
      id: charges.id,
      patientId: charges.patientId,
      familyName: patients.familyName,
      givenName: patients.givenName,
      recordNumber: patients.recordNumber,
      description: priceItems.name,
      amountMinor: charges.amountMinor,
      currency: charges.currency,
      status: charges.status,
      createdAt: charges.createdAt,
      appointmentId: appointments.id,
      appointmentStatus: appointments.status,
      startsAt: appointments.startsAt,
      timeZone: sites.timeZone,
      site: sites.name,
      paidAt: latestPayment<Date | null>(sql`${payments.settledAt}`).mapWith(charges.createdAt),
      payment: latestPayment<Charge['payment']>(sql`${payments.status}`),
      refund: refundStatus,
    })
    .from(charges)
    .innerJoin(patients, eq(patients.id, charges.patientId))
    .innerJoin(priceItems, eq(priceItems.id, charges.priceItemId))
    .leftJoin(appointments, eq(appointments.id, charges.appointmentId))
    .leftJoin(classDates, eq(classDates.id, appointments.classDateId))
    .leftJoin(sites, eq(sites.id, classDates.siteId))
    .$dynamic();
}

type ChargeRow = Awaited<ReturnType<typeof selectCharges>>[number];

function appointmentOf({
  appointmentId,
  appointmentStatus,
  startsAt,
  timeZone,
  site,
}: ChargeRow): Charge['appointment'] {
  if (appointmentId === null || startsAt === null || timeZone === null || site === null) {
    return null;
  }
  const cancelled = appointmentStatus === 'cancelled';
  return { id: appointmentId, startsAt: startsAt.toISOString(), timeZone, site, cancelled };
}

function present(row: ChargeRow): Charge {
  const { id, patientId, description, amountMinor, currency, status, payment, refund } = row;
  return {
    id,
    patientId,
    description,
    amountMinor,
    currency,
    status,
    createdAt: row.createdAt.toISOString(),
    appointment: appointmentOf(row),
    paidAt: row.paidAt?.toISOString() ?? null,
    payment,
    refund,
  };
}

const presentForStaff = (row: ChargeRow): StaffCharge => ({
  ...present(row),
  displayName: `${row.givenName} ${row.familyName}`,
  recordNumber: row.recordNumber,
});

/** A patient's charges, newest first. */
export async function chargesOf(tx: Queryable, patientId: string): Promise<Charge[]> {
  const rows = await selectCharges(tx)
    .where(eq(charges.patientId, patientId))
    .orderBy(desc(charges.createdAt), desc(charges.id));
  return rows.map(present);
}

/** @returns undefined when there is none */
export async function findCharge(tx: Queryable, id: string): Promise<Charge | undefined> {
  const [row] = await selectCharges(tx).where(eq(charges.id, id));
  return row && present(row);
}

export interface ChargeFilter {
  readonly status?: Charge['status'] | undefined;
  readonly siteId?: string | undefined;
  /** Nothing but blanks searches for nothing. */
  readonly q?: string | undefined;
  readonly after?: readonly [createdAt: string, id: string] | undefined;
  readonly limit: number;
}

const olderThan = ([createdAt, id]: readonly [string, string]): SQL | undefined => {
  const at = new Date(createdAt);
  return or(lt(charges.createdAt, at), and(eq(charges.createdAt, at), lt(charges.id, id)));
};

/** Charges of the actor's sites, newest first; one more than the limit tells whether there are more. */
export async function staffCharges(
  tx: Queryable,
  actor: Actor,
  { status, siteId, q, after, limit }: ChargeFilter,
): Promise<StaffCharge[]> {
  const rows = await selectCharges(tx)
    .where(
      and(
        atOwnSites(actor, patients.siteId),
        status && inArray(charges.status, [status]),
        siteId === undefined ? undefined : eq(patients.siteId, siteId),
        q?.trim() ? matchesSearch(q) : undefined,
        after && olderThan(after),
      ),
    )
    .orderBy(desc(charges.createdAt), desc(charges.id))
    .limit(limit + 1);
  return rows.map(presentForStaff);
}

/** One charge with whom it is for; undefined when there is none. */
export async function findStaffCharge(tx: Queryable, id: string): Promise<StaffCharge | undefined> {
  const [row] = await selectCharges(tx).where(eq(charges.id, id));
  return row && presentForStaff(row);
}
