import type { MetersPerMinute, Mets, Range } from '../units';
import { metsOf, mphOf, snapDown, speedOfMph, vo2Of } from '../units';
import { levelRunningSpeed, runningSpeedInRange, runningVo2 } from './metabolic-equations';
import type { Equipment, WorkloadPoint } from './prescribing';

/** A level run at one end of the work target, for patients who are seen to run; it stands beside the prescription's own rows. */
export interface RunWorkload {
  readonly modality: 'treadmill-run';
  readonly point: WorkloadPoint;
  readonly speedMetersPerMinute: MetersPerMinute | null;
  readonly speedMph: number | null;
  readonly gradePercent: number | null;
  readonly mets: Mets | null;
  readonly withinEquationRange: boolean;
  readonly why: string | null;
}

const tooSlow =
  'Running at this work is outside the validated range of the equation, from 80 m/min (3 mph): walk instead.';

function runAt(point: WorkloadPoint, work: Mets, { treadmill }: Equipment): RunWorkload {
  const speedMph = snapDown(mphOf(levelRunningSpeed(vo2Of(work))), treadmill.speedMph);
  const speed = speedOfMph(speedMph);
  const modality = 'treadmill-run';
  if (!runningSpeedInRange(speed)) {
    return {
      modality,
      point,
      speedMetersPerMinute: null,
      speedMph: null,
      gradePercent: null,
      mets: null,
      withinEquationRange: false,
      why: tooSlow,
    };
  }
  return {
    modality,
    point,
    speedMetersPerMinute: speed,
    speedMph,
    gradePercent: 0,
    mets: metsOf(runningVo2(speed, 0)),
    withinEquationRange: true,
    why: null,
  };
}

/** Level runs at the low and the high end of the work target, snapped down to the treadmill; [] without a target. */
export const runWorkloads = (target: Range<Mets> | null, equipment: Equipment): RunWorkload[] =>
  target === null
    ? []
    : [runAt('start', target.lower, equipment), runAt('limit', target.upper, equipment)];
