import type { ChangedSite, SiteChange } from '@shared/contracts/sites-contract';
import type { Transaction } from '../database/client';
import { fail, type Failure } from '../http/failure';
import { moveReminders } from '../messages/reminders-service';
import { planSite } from '../schedule/class-dates-service';
import { lockSite, updateSite } from './sites-repository';

/** What was changed, by the names of the fields alone. */
export interface SiteChanged extends ChangedSite {
  readonly fields: readonly string[];
}

/**
 * Changes a site. In another zone its classes to come keep their time on the wall, so that they, the places in them and their
 * reminders move; what has begun stays where it was.
 * @returns `not-found` or `stale-version`
 * @throws on constraints `sites_name_unique`, `appointments_no_overlap`
 */
export async function changeSite(
  tx: Transaction,
  id: string,
  change: SiteChange,
  now: Date,
): Promise<SiteChanged | Failure> {
  const before = await lockSite(tx, id);
  if (!before) return fail('not-found');
  if (before.version !== change.version) return fail('stale-version');
  const names = ['name', 'timeZone', 'address', 'phone'] as const;
  const fields = names.filter((name) => before[name] !== change[name]);
  const site = await updateSite(tx, id, change);
  if (!fields.includes('timeZone')) return { site, fields, movedClassDates: 0 };
  const { moved } = await planSite(tx, id, now);
  await moveReminders(tx, id, now);
  return { site, fields, movedClassDates: moved };
}
