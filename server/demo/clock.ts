import type { SiteKey } from './accounts';
import { dayAt, instantAt } from './days';
import type { Day } from './days';
import { closingHour, demoSites } from './program';

/** The moment up to which the story is told. Whatever it tells of the past is the same from every later moment. */
export interface Clock {
  /** The program's day of the first start. */
  readonly anchor: Day;
  readonly now: Date;
  readonly today: (site: SiteKey) => Day;
  /** Classes that end by then have been held and signed; the later ones are for whoever opens the demonstration. */
  readonly heldUntil: (site: SiteKey) => Date;
}

const signedWithinMs = 2 * 3_600_000;

export function clockAt(anchor: Day, now: Date): Clock {
  const sites = demoSites.map(({ key, timeZone }) => {
    const today = dayAt(now, timeZone);
    // The last two classes stay open until midnight, so that the floor has work at any hour.
    const lastPlayed = instantAt(today, (closingHour - 2) * 60, timeZone).getTime();
    const heldUntil = new Date(Math.min(now.getTime() - signedWithinMs, lastPlayed));
    return [key, { today, heldUntil }] as const;
  });
  const at = new Map(sites);
  const known = (site: SiteKey) => {
    const found = at.get(site);
    if (!found) throw new RangeError(site);
    return found;
  };
  return {
    anchor,
    now,
    today: (site) => known(site).today,
    heldUntil: (site) => known(site).heldUntil,
  };
}

/** The day of the first start, by the clock of the program's first site. */
export function anchorAt(now: Date): Day {
  return dayAt(now, demoSites[0]?.timeZone ?? 'UTC');
}
