import { v7 as uuidv7 } from 'uuid';
import { CLASS_DATES_AHEAD_DAYS } from '@shared/scheduling/booking-window';
import { occurrenceOn, occurrences } from '@shared/scheduling/class-dates';
import { addDays, localDateAt } from '@shared/scheduling/wall-time';
import type { Database, Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import {
  insertClassDates,
  lockFutureDates,
  lockSitePlan,
  moveClassDates,
  readClosedDates,
  readTemplates,
  type TemplateRow,
} from './class-dates-repository';

/** What a run of the planner did. */
export interface PlanningOutcome {
  /** Class dates that were not there before. */
  readonly made: number;
  /** Class dates to come whose instant changed, since the rules of a zone or the zone of a site did. */
  readonly moved: number;
}

/** The local dates for which a class's dates are made: from today at the site on. */
export function planningWindow(now: Date, timeZone: string): { from: string; to: string } {
  const from = localDateAt(now, timeZone);
  return { from, to: addDays(from, CLASS_DATES_AHEAD_DAYS) };
}

/** Makes the dates of one class that are missing, closed days left out. @returns how many */
export async function makeClassDates(
  tx: Transaction,
  template: TemplateRow,
  closed: ReadonlySet<string>,
  window: { readonly from: string; readonly to: string },
): Promise<number> {
  const made = occurrences(template, window, template.timeZone, closed);
  return insertClassDates(
    tx,
    template,
    made.map((occurrence) => ({ ...occurrence, id: uuidv7() })),
  );
}

/** Scheduled dates to come whose instant is no longer that of their wall time, with the one that is. */
async function displacedDates(tx: Transaction, template: TemplateRow, now: Date) {
  const dates = await lockFutureDates(tx, template.id, now);
  return dates
    .filter(({ status }) => status === 'scheduled')
    .map((date) => ({ date, due: occurrenceOn(date.localDate, template, template.timeZone) }))
    .filter(({ date, due }) => +date.startsAt !== +due.startsAt || +date.endsAt !== +due.endsAt)
    .map(({ date, due }) => ({ ...due, id: date.id }));
}

/**
 * Makes the class dates of a site that are missing, and moves those to come to their wall time in the site's zone.
 * @throws on constraint `appointments_no_overlap` when a patient would be in two classes at once
 */
export async function planSite(
  tx: Transaction,
  siteId: string,
  now: Date,
): Promise<PlanningOutcome> {
  await lockSitePlan(tx, siteId);
  const closed = await readClosedDates(tx, siteId, addDays(now.toISOString().slice(0, 10), -1));
  const templates = await readTemplates(tx, siteId);
  const moved: Awaited<ReturnType<typeof displacedDates>> = [];
  for (const template of templates) moved.push(...(await displacedDates(tx, template, now)));
  if (moved.length > 0) await moveClassDates(tx, moved);
  let made = 0;
  for (const template of templates) {
    made += await makeClassDates(tx, template, closed, planningWindow(now, template.timeZone));
  }
  return { made, moved: moved.length };
}

/**
 * Makes every site's class dates ahead, a transaction a site. It may run at once in several processes, and again: what there
 * is stays.
 */
export async function planClassDates(database: Database, now: Date): Promise<PlanningOutcome> {
  const sites = await database.$client.query<{ id: string }>('SELECT id FROM sites ORDER BY id');
  let [made, moved] = [0, 0];
  for (const { id } of sites.rows) {
    const outcome = await inTransaction(database, (tx) => planSite(tx, id, now));
    made += outcome.made;
    moved += outcome.moved;
  }
  return { made, moved };
}
