import type { Meters, Mets } from '../../../units';
import { meters, metsOf, snapDown, toMillionths, vo2Of } from '../../../units';
import { steppingInRange, steppingRate, steppingVo2 } from '../../metabolic-equations';
import type { StepWorkload, StepperWorkload, WorkloadPoint } from '../answer';
import type { Equipment } from '../policy';
import { outsideRange } from './point';
import type { WorkPoint } from './point';

/** The step on which work is prescribed, m, where the program has it. */
const usualHeight = 0.15;

const notInRange = outsideRange('Stepping at this work is', '12–30 step cycles/min');

const row = (
  point: WorkloadPoint,
  stepHeightMeters: Meters | null,
  stepsPerMinute: number | null,
  mets: Mets | null,
  why: string | null,
): StepWorkload => ({
  modality: 'step',
  point,
  stepHeightMeters,
  stepsPerMinute,
  mets,
  withinEquationRange: mets !== null,
  why,
});

/** The highest of the program's steps up to the usual height, else its lowest. */
function heightOf({ lowest, highest, by }: Equipment['step']): Meters {
  const upTo = Math.min(usualHeight, highest);
  return meters(upTo < lowest ? lowest : toMillionths(lowest + snapDown(upTo - lowest, by)));
}

/** Stepping at the point, a whole number of cycles a minute. */
export function stepWorkload({ point, work, equipment }: WorkPoint): StepWorkload {
  const height = heightOf(equipment.step);
  const rate = snapDown(steppingRate(vo2Of(work), height), 1);
  if (!steppingInRange(rate, height)) return row(point, null, null, null, notInRange);
  return row(point, height, rate, metsOf(steppingVo2(rate, height)), null);
}

/** Machines that show METs are set to the point itself. */
export const stepperWorkload = ({ point, work }: WorkPoint): StepperWorkload => ({
  modality: 'stepper',
  point,
  mets: work,
  withinEquationRange: true,
  why: null,
});
