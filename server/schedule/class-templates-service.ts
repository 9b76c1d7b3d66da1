import { v7 as uuidv7 } from 'uuid';
import type {
  ClassTemplateChange,
  NewClassTemplate,
  SavedClassTemplate,
} from '@shared/contracts/class-templates-contract';
import { occurrences } from '@shared/scheduling/class-dates';
import { addDays } from '@shared/scheduling/wall-time';
import type { Transaction } from '../database/client';
import { fail, type Failure } from '../http/failure';
import {
  lockFutureDates,
  lockSitePlan,
  moveClassDates,
  readClosedDates,
  readTemplate,
  reopenClassDates,
  resizeClassDates,
  withdrawClassDates,
  type FutureDateRow,
  type TemplateRow,
} from './class-dates-repository';
import { makeClassDates, planningWindow } from './class-dates-service';
import {
  findClassTemplate,
  insertClassTemplate,
  updateClassTemplate,
} from './class-templates-repository';

/** Makes a class and its dates ahead. @returns it, or null when there is no such site */
export async function createClassTemplate(
  tx: Transaction,
  now: Date,
  given: NewClassTemplate,
): Promise<SavedClassTemplate | null> {
  if (!(await lockSitePlan(tx, given.siteId))) return null;
  const id = uuidv7();
  await insertClassTemplate(tx, id, given);
  await fillWindow(tx, now, id);
  return saved(tx, id, []);
}

/**
 * Changes a class and its dates to come. Its places are never set below what is booked; its days and hours only change where
 * nobody is booked, since those people must be spoken to first.
 * @returns it, or `not-found`, `stale-version`, `class-has-bookings` with the dates that hold bookings
 */
export async function changeClassTemplate(
  tx: Transaction,
  now: Date,
  id: string,
  change: ClassTemplateChange,
): Promise<SavedClassTemplate | Failure> {
  const known = await findClassTemplate(tx, id);
  if (known === null) return fail('not-found');
  await lockSitePlan(tx, known.siteId);
  if (!(await updateClassTemplate(tx, id, change))) return fail('stale-version');
  const template = await readTemplate(tx, id);
  if (template === null) return fail('not-found');
  const dates = await lockFutureDates(tx, id, now);
  const plan = replan(template, dates, now);
  const held = [...plan.withdrawn, ...plan.moved].filter(({ booked }) => booked > 0);
  if (held.length > 0) return hasBookings(held);
  await withdrawClassDates(
    tx,
    plan.withdrawn.map(({ id: dateId }) => dateId),
  );
  await moveClassDates(tx, plan.moved);
  await reopenClassDates(
    tx,
    plan.reopened.map(({ id: dateId }) => dateId),
  );
  await resizeClassDates(
    tx,
    dates.map(({ id: dateId }) => dateId),
    template,
  );
  await fillWindow(tx, now, id);
  const kept = dates.filter(({ booked }) => booked > template.capacity);
  return saved(tx, id, kept);
}

/** What an edited class does to its dates to come: some fall away, some change their hour, some come back. */
function replan(template: TemplateRow, dates: readonly FutureDateRow[], now: Date) {
  const { from } = planningWindow(now, template.timeZone);
  const last = dates.reduce(
    (latest, { localDate }) => (localDate > latest ? localDate : latest),
    from,
  );
  const due = new Map(
    occurrences(template, { from, to: addDays(last, 1) }, template.timeZone).map((one) => [
      one.localDate,
      one,
    ]),
  );
  const withdrawn = dates.filter(({ localDate }) => !due.has(localDate));
  const moved = dates.flatMap((date) => {
    const occurrence = due.get(date.localDate);
    const same =
      occurrence === undefined ||
      (+occurrence.startsAt === +date.startsAt && +occurrence.endsAt === +date.endsAt);
    return same ? [] : [{ ...date, ...occurrence }];
  });
  const reopened = dates.filter(
    ({ localDate, status }) => status === 'cancelled' && due.has(localDate),
  );
  return { withdrawn, moved, reopened };
}

function hasBookings(held: readonly FutureDateRow[]): Failure {
  const dates = held.map(({ localDate }) => localDate).sort();
  return fail('class-has-bookings', {
    errors: dates.map((date) => ({
      path: 'recurrence',
      code: 'class-has-bookings',
      message: `Patients are booked on ${date}`,
    })),
  });
}

async function fillWindow(tx: Transaction, now: Date, id: string): Promise<void> {
  const template = await readTemplate(tx, id);
  if (template === null) return;
  const window = planningWindow(now, template.timeZone);
  const closed = await readClosedDates(tx, template.siteId, window.from);
  await makeClassDates(tx, template, closed, window);
}

async function saved(
  tx: Transaction,
  id: string,
  kept: readonly FutureDateRow[],
): Promise<SavedClassTemplate> {
  const template = await findClassTemplate(tx, id);
  if (template === null) throw new Error(`the class ${id} was just written and is gone`);
  const keptPlaces = kept.map(({ localDate, booked }) => ({ localDate, booked }));
  return { template, keptPlaces };
}
