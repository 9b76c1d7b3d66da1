import { and, eq, inArray, or, sql, type SQL } from 'drizzle-orm';
import { patients } from '../database/schema';
import { isStaff, type Actor } from './actor';

/** What decides who may open a patient's record. */
export interface RecordOwner {
  readonly siteId: string;
  readonly userId: string | null;
}

/** Staff open the records of their sites; a patient opens their own alone. */
export const mayOpenRecord = (actor: Actor, record: RecordOwner): boolean =>
  (isStaff(actor) && actor.siteIds.includes(record.siteId)) || record.userId === actor.id;

/** The same rule as a condition on `patients`, for lists. */
export function openRecords(actor: Actor): SQL {
  const own = eq(patients.userId, actor.id);
  if (!isStaff(actor) || actor.siteIds.length === 0) return own;
  return or(inArray(patients.siteId, [...actor.siteIds]), own) ?? own;
}

/** Whether a member of staff works at the site; a condition for lists of what belongs to a site. */
export const atOwnSites = (actor: Actor, siteId: Parameters<typeof inArray>[0]): SQL =>
  actor.siteIds.length === 0 ? sql`false` : (and(inArray(siteId, [...actor.siteIds])) as SQL);
