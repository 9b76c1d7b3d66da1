import type { Meters, MetersPerMinute } from '../units';
import { metersPerMinute } from '../units';

/**
 * Mean speed of a six-minute walk.
 * @param distance walked in six minutes, m, above 0
 * @returns m/min
 * @see test: ATS statement. Am J Respir Crit Care Med 2002;166:111–117
 */
export const sixMinuteWalkSpeed = (distance: Meters): MetersPerMinute =>
  metersPerMinute(distance / 6);
