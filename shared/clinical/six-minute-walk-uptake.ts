import type { Meters, Vo2 } from '../units';
import { vo2 } from '../units';

/**
 * Peak uptake from a six-minute walk: 4.948 + 0.023 m, mL/kg/min. It fits group means; for one patient it is weak
 * (error 3.03 mL/kg/min), and it is a peak: the uptake of walking at that speed is less.
 * @see Ross et al. BMC Pulm Med 2010;10:31
 */
export const peakVo2OfWalk = (distance: Meters): Vo2 => vo2(4.948 + 0.023 * distance);
