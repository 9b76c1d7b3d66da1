import { and, inArray, sql, type SQL } from 'drizzle-orm';
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

const opens = (siteIds: unknown, userId: unknown): SQL =>
  sql`(${patients.siteId} = ANY(${siteIds}::uuid[]) OR ${patients.userId} = ${userId})`;

const ownSites = (actor: Actor): readonly string[] => (isStaff(actor) ? actor.siteIds : []);

/** The same rule as a condition on `patients`, for lists. */
export const openRecords = (actor: Actor): SQL => opens(sql.param(ownSites(actor)), actor.id);

/** The same in a statement that is prepared: takes `openRecordsOf`. */
export const openRecordsPrepared = opens(sql.placeholder('ownSites'), sql.placeholder('reader'));

export const openRecordsOf = (actor: Actor) => ({ ownSites: ownSites(actor), reader: actor.id });

/** Whether a member of staff works at the site; a condition for lists of what belongs to a site. */
export const atOwnSites = (actor: Actor, siteId: Parameters<typeof inArray>[0]): SQL =>
  actor.siteIds.length === 0 ? sql`false` : (and(inArray(siteId, [...actor.siteIds])) as SQL);
