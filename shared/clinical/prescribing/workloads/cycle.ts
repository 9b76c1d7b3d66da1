import type { Mets, Watts } from '../../../units';
import { metsOf, snapDown, vo2Of, watts } from '../../../units';
import { cyclingPower, cyclingPowerInRange, cyclingVo2 } from '../../metabolic-equations';
import type { CycleWorkload, WorkloadPoint } from '../answer';
import { outsideRange, weightNotKnown } from './point';
import type { WorkPoint } from './point';

const notInRange = outsideRange('Cycling at this work is', '50–200 W');

const row = (
  point: WorkloadPoint,
  powerWatts: Watts | null,
  mets: Mets | null,
  why: string | null,
): CycleWorkload => ({
  modality: 'cycle',
  point,
  powerWatts,
  mets,
  withinEquationRange: mets !== null,
  why,
});

/** Leg cycling at the point, snapped down to the machine's step. */
export function cycleWorkload({ point, work, weight, equipment }: WorkPoint): CycleWorkload {
  if (weight === null) return row(point, null, null, weightNotKnown);
  const power = watts(snapDown(cyclingPower(vo2Of(work), weight), equipment.cycle.power));
  if (!cyclingPowerInRange(power)) return row(point, null, null, notInRange);
  return row(point, power, metsOf(cyclingVo2(power, weight)), null);
}
