import { v7 as uuidv7 } from 'uuid';
import type { Closure, ClosureRequest } from '@shared/contracts/class-templates-contract';
import type { Database, Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import { fail, Failure } from '../http/failure';
import { lockSitePlan } from './class-dates-repository';
import { planClassDates } from './class-dates-service';
import type { ScheduleContext } from './schedule-context';
import { cancelForProgram } from './transition-service';

const CLOSURE = 'id, site_id AS "siteId", local_date::text AS "localDate", reason';

export async function listClosures(
  tx: Transaction,
  siteId: string,
  from: string,
): Promise<Closure[]> {
  const { rows } = await tx.connection.query<Closure>(
    `SELECT ${CLOSURE} FROM closures WHERE site_id = $1 AND local_date >= $2 ORDER BY local_date`,
    [siteId, from],
  );
  return rows;
}

/** The site of a closure, or null when there is none. */
export async function findClosureSite(database: Database, id: string): Promise<string | null> {
  const { rows } = await database.$client.query<{ siteId: string }>(
    'SELECT site_id AS "siteId" FROM closures WHERE id = $1',
    [id],
  );
  return rows[0]?.siteId ?? null;
}

/** Keeps the closure and closes its class dates, so that no booking comes in afterwards. */
async function closeDates(tx: Transaction, asked: ClosureRequest): Promise<Closure | Failure> {
  const { siteId, localDate, reason } = asked;
  if (!(await lockSitePlan(tx, siteId))) return fail('not-found');
  const { rows } = await tx.connection.query<Closure>(
    `INSERT INTO closures (id, site_id, local_date, reason) VALUES ($1, $2, $3, $4)
     ON CONFLICT (site_id, local_date) DO UPDATE SET reason = EXCLUDED.reason RETURNING ${CLOSURE}`,
    [uuidv7(), siteId, localDate, reason],
  );
  await tx.connection.query(
    `UPDATE class_dates SET status = 'closed', version = version + 1
      WHERE id IN (SELECT id FROM class_dates WHERE site_id = $1 AND local_date = $2 AND status = 'scheduled'
                    ORDER BY id FOR NO KEY UPDATE)`,
    [siteId, localDate],
  );
  return rows[0] ?? fail('not-found');
}

async function bookedOn(database: Database, { siteId, localDate }: Closure): Promise<string[]> {
  const { rows } = await database.$client.query<{ id: string }>(
    `SELECT a.id FROM appointments a JOIN class_dates d ON d.id = a.class_date_id
      WHERE d.site_id = $1 AND d.local_date = $2 AND d.status = 'closed' AND a.status = 'booked' ORDER BY a.id`,
    [siteId, localDate],
  );
  return rows.map(({ id }) => id);
}

/**
 * Closes a site for a local date: first its classes take no more bookings, then each patient booked is cancelled and told, a
 * transaction each, so that a long list holds nobody up. Asked again, it finishes what was left.
 * @returns the closure and how many appointments it cancelled, or `not-found` when there is no such site
 */
export async function closeSite(
  database: Database,
  context: ScheduleContext,
  asked: ClosureRequest,
): Promise<{ readonly closure: Closure; readonly cancelled: number } | Failure> {
  const closure = await inTransaction(database, (tx) => closeDates(tx, asked));
  if (closure instanceof Failure) return closure;
  let cancelled = 0;
  for (const id of await bookedOn(database, closure)) {
    const done = await inTransaction(database, (tx) =>
      cancelForProgram(tx, context, id, `Closed: ${closure.reason}`),
    );
    cancelled += Number(done);
  }
  return { closure, cancelled };
}

/** Takes a closure back: its class dates are open again; who was cancelled stays so until booked anew. */
export async function reopenSite(database: Database, now: Date, id: string): Promise<boolean> {
  const reopened = await inTransaction(database, async (tx) => {
    const { rows } = await tx.connection.query<Closure>(
      `DELETE FROM closures WHERE id = $1 RETURNING ${CLOSURE}`,
      [id],
    );
    const [closure] = rows;
    if (closure === undefined) return false;
    await lockSitePlan(tx, closure.siteId);
    await tx.connection.query(
      `UPDATE class_dates SET status = 'scheduled', version = version + 1
        WHERE site_id = $1 AND local_date = $2 AND status = 'closed'`,
      [closure.siteId, closure.localDate],
    );
    return true;
  });
  if (reopened) await planClassDates(database, now);
  return reopened;
}
