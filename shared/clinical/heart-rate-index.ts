import type { Bpm, Mets } from '../units';
import { mets } from '../units';

/**
 * Work from the heart-rate index: 6 × (rate / resting) − 5 METs. Not on a beta blocker, nor where heart rate cannot lead.
 * @param resting bpm, above 0
 * @throws RangeError when the resting rate is not above 0
 * @see Wicks et al. Med Sci Sports Exerc 2011;43:2005–2012, from memory
 */
export function metsOfHeartRateIndex(rate: Bpm, resting: Bpm): Mets {
  if (resting <= 0) throw new RangeError('heart-rate index: a resting rate above 0 is expected');
  return mets((6 * rate) / resting - 5);
}
