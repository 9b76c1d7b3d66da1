import { DateTime } from 'luxon';

/** Whole years of age on a local date; both dates YYYY-MM-DD. */
export const ageOn = (birthDate: string, localDate: string): number =>
  Math.floor(DateTime.fromISO(localDate).diff(DateTime.fromISO(birthDate), 'years').years);
