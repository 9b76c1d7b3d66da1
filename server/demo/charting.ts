import type { SiteKey, StaffKey } from './accounts';
import type { Day } from './days';
import { instantAt } from './days';
import { idAt } from './dice';
import { siteOf } from './program';

/** When everybody's account was made: a week before the first patient. */
const hired = (anchor: Day) => instantAt(anchor - 434, 9 * 60, 'America/New_York');

export const staffId = (key: StaffKey, anchor: Day): string => idAt(hired(anchor), 'user', key);
export const hiredAt = hired;
export const accountUserId = (anchor: Day): string =>
  idAt(hired(anchor), 'user', 'patient account');

/** Who does the work at a site. */
const crew: Record<
  SiteKey,
  { physiologist: StaffKey; nurse: StaffKey; physician: StaffKey; desk: StaffKey }
> = {
  quayside: {
    physiologist: 'physiologist',
    nurse: 'nurse',
    physician: 'physician',
    desk: 'front-desk',
  },
  'mill-street': {
    physiologist: 'second-physiologist',
    nurse: 'second-nurse',
    physician: 'second-physician',
    desk: 'front-desk',
  },
};

export interface Crew {
  readonly physiologist: string;
  readonly nurse: string;
  readonly physician: string;
  readonly desk: string;
}

/** The ids of those who write in the records of a site. */
export function crewOf(site: SiteKey, anchor: Day): Crew {
  const { physiologist, nurse, physician, desk } = crew[site];
  return {
    physiologist: staffId(physiologist, anchor),
    nurse: staffId(nurse, anchor),
    physician: staffId(physician, anchor),
    desk: staffId(desk, anchor),
  };
}

/** Wall times of a day's work, minutes after midnight. */
export const workday = {
  referral: 9 * 60 + 20,
  intake: 10 * 60,
  range: 11 * 60,
  physiologistSigns: 8 * 60 + 15,
  physicianSigns: 7 * 60 + 40,
  chartChange: 14 * 60 + 10,
  review: 15 * 60 + 30,
} as const;

export const atSite = (site: SiteKey, day: Day, minutes: number): Date =>
  instantAt(day, minutes, siteOf(site).timeZone);
