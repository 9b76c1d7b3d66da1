import type { Kilograms, Mets, Watts } from '../../../units';
import { bpm, metsOf, roundDown, roundUp, snapDown, vo2Of, watts } from '../../../units';
import {
  armCyclingPower,
  armCyclingPowerInRange,
  armCyclingVo2,
  cyclingPower,
} from '../../metabolic-equations';
import type { ArmWorkload } from '../answer';
import type { PrescriptionPolicy } from '../policy';
import type { HeartRateRange, TestMode } from '../request';
import { outsideRange, weightNotKnown } from './point';
import type { WorkPoint } from './point';

const notInRange = outsideRange('Arm cycling at this work is', '25–125 W');

const row = (
  { point, arm }: WorkPoint,
  powerWatts: Watts | null,
  mets: Mets | null,
  why: string | null,
): ArmWorkload => ({
  modality: 'arm',
  point,
  powerWatts,
  target: arm.target,
  mets,
  withinEquationRange: mets !== null,
  why,
});

/** An arm test's work is arm work; from a leg test the arms do a fraction of the unsnapped cycle power. */
function powerOf({ work, arm }: WorkPoint, weight: Kilograms): Watts {
  const uptake = vo2Of(work);
  return arm.testMode === 'arm'
    ? armCyclingPower(uptake, weight)
    : watts(arm.workFraction * cyclingPower(uptake, weight));
}

/** Arm cycling at the point, snapped down to the machine's step, with the range for the arms. */
export function armWorkload(at: WorkPoint): ArmWorkload {
  const { weight, equipment } = at;
  if (weight === null) return row(at, null, null, weightNotKnown);
  const power = watts(snapDown(powerOf(at, weight), equipment.arm.power));
  if (!armCyclingPowerInRange(power)) return row(at, null, null, notInRange);
  return row(at, power, metsOf(armCyclingVo2(power, weight)), null);
}

/** The range for arm work: the target of an arm test as it is, of a leg test a policy's number of beats lower. */
export function armTargetOf(
  target: HeartRateRange | null,
  testMode: TestMode,
  { arm }: PrescriptionPolicy,
): HeartRateRange | null {
  if (target === null || testMode === 'arm') return target;
  return {
    lower: bpm(roundUp(target.lower - arm.rateBelowLegs)),
    upper: bpm(roundDown(target.upper - arm.rateBelowLegs)),
  };
}
