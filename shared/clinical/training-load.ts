import type { Minutes } from '../units';
import type { KnownSex } from './known-sex';

/**
 * Training loads, arbitrary units; not to be compared across methods. Those by heart rate are wrong by construction where the
 * maximum is an estimate, and have no meaning where heart rate cannot lead.
 */

const banister = {
  male: { factor: 0.64, exponent: 1.92 },
  female: { factor: 0.86, exponent: 1.67 },
} as const;

/**
 * Banister's training impulse: min × r × k × e^(b r). Men k 0.64, b 1.92; women k 0.86, b 1.67 (constants from memory; a
 * widely copied error keeps 0.64 for women).
 * @param fraction mean fraction of heart-rate reserve, 0–1
 */
export function banisterLoad(time: Minutes, fraction: number, sexAtBirth: KnownSex): number {
  const { factor, exponent } = banister[sexAtBirth];
  return time * fraction * factor * Math.exp(exponent * fraction);
}

/**
 * Edwards' zone of a percentage of the maximal rate: 1 from 50 %, then one for each 10, 5 from 90; below 50 % none, 0.
 * A zone holds its lower edge: exactly 60 % is zone 2. From memory.
 */
export const edwardsZone = (percentOfMaximum: number): number =>
  Math.min(5, Math.max(0, Math.floor(percentOfMaximum / 10) - 4));

/** Edwards' load: minutes in zones 1 to 5, each times its number. From memory. */
export const edwardsLoad = (
  zones: readonly [Minutes, Minutes, Minutes, Minutes, Minutes],
): number => zones.reduce<number>((load, time, index) => load + time * (index + 1), 0);

/**
 * Session load: effort × minutes, the effort asked about 30 minutes after the session.
 * @param effort 0–10 on Borg's CR-10 scale; a score of the 6–20 scale is not valid here
 * @throws RangeError when the effort lies outside 0–10
 * @see Foster et al. J Strength Cond Res 2001;15:109–115
 */
export function sessionLoad(effort: number, time: Minutes): number {
  if (!(effort >= 0 && effort <= 10)) throw new RangeError('session load: CR-10 is 0 to 10');
  return effort * time;
}
