import type { Meters } from '../../../units';
import { metsOf, mphOf, snapDown, speedOfMph, toMillionths, vo2Of } from '../../../units';
import {
  levelWalkingSpeed,
  walkingGrade,
  walkingSpeedInRange,
  walkingVo2,
} from '../../metabolic-equations';
import { sixMinuteWalkSpeed } from '../../six-minute-walk';
import type { TreadmillWorkload, WorkloadPoint } from '../answer';
import type { PrescriptionPolicy } from '../policy';
import { outsideRange } from './point';
import type { WorkPoint } from './point';

/** Level walking is set between these speeds; more work is made by grade at the upper one. */
const slowestMph = 1.9;
const fastestMph = 3;
const steepestPercent = 10;

const modality = 'treadmill-walk';
const tooSlow = outsideRange(`Walking below ${slowestMph} mph is`, '50–100 m/min');
const tooFast = outsideRange('The start from the six-minute walk is', '50–100 m/min');
const tooSteep = `More work than ${fastestMph} mph at ${steepestPercent} % grade.`;

const unset = (point: WorkloadPoint, why: string): TreadmillWorkload => ({
  modality,
  point,
  speedMetersPerMinute: null,
  speedMph: null,
  gradePercent: null,
  mets: null,
  withinEquationRange: false,
  why,
});

/** Level from 1.9 to 3.0 mph, then by grade at 3.0 mph up to 10 %, snapped down to the treadmill's steps. */
export function treadmillWorkload({ point, work, equipment }: WorkPoint): TreadmillWorkload {
  const uptake = vo2Of(work);
  const { treadmill: step } = equipment;
  const levelMph = mphOf(levelWalkingSpeed(uptake));
  const onLevel = toMillionths(levelMph) <= fastestMph;
  const speedMph = snapDown(Math.min(levelMph, fastestMph), step.speedMph);
  if (speedMph < slowestMph) return unset(point, tooSlow);
  const speed = speedOfMph(speedMph);
  const gradePercent = onLevel ? 0 : snapDown(100 * walkingGrade(uptake, speed), step.gradePercent);
  if (gradePercent > steepestPercent) return unset(point, tooSteep);
  return {
    modality,
    point,
    speedMetersPerMinute: speed,
    speedMph,
    gradePercent,
    mets: metsOf(walkingVo2(speed, gradePercent / 100)),
    withinEquationRange: true,
    why: null,
  };
}

/** A flat start at a fraction of the speed of the six-minute walk; below the equation's range it keeps its speed. */
export function walkStart(distance: Meters, policy: PrescriptionPolicy): TreadmillWorkload {
  const walkedMph = mphOf(sixMinuteWalkSpeed(distance)) * policy.walk.startFraction;
  const speedMph = snapDown(walkedMph, policy.equipment.treadmill.speedMph);
  const speed = speedOfMph(speedMph);
  const isSlow = speedMph < slowestMph;
  if (!isSlow && !walkingSpeedInRange(speed)) return unset('start', tooFast);
  return {
    modality,
    point: 'start',
    speedMetersPerMinute: speed,
    speedMph,
    gradePercent: 0,
    mets: isSlow ? null : metsOf(walkingVo2(speed, 0)),
    withinEquationRange: !isSlow,
    why: 'six-minute walk',
  };
}
