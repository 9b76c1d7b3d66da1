import type { Kilograms, Meters, Mets, Vo2, Watts } from '../../units';
import {
  isMets,
  mets,
  metsOf,
  mphOf,
  metersPerMinute,
  snapDown,
  speedOfMph,
  toMillionths,
  vo2Of,
  watts,
} from '../../units';
import type { Gait } from '../gait';
import { treadmillSpeedInRange, treadmillVo2 } from '../gait';
import * as equations from '../metabolic-equations';
import type { Equipment } from '../prescribing/policy';

interface TreadmillSetting {
  readonly modality: 'treadmill-walk' | 'treadmill-run';
  readonly speedMph: number;
  readonly gradePercent: number;
}

/** How a machine is set. Walking and running are chosen by the gait that is seen. */
export type MachineSetting =
  | TreadmillSetting
  | { readonly modality: 'cycle' | 'arm'; readonly powerWatts: Watts }
  | {
      readonly modality: 'step';
      readonly stepHeightMeters: Meters;
      readonly stepsPerMinute: number;
    }
  | { readonly modality: 'stepper'; readonly mets: Mets };

/** What is needed besides the setting itself. */
export interface MachineFacts {
  readonly weight: Kilograms | null;
  readonly equipment: Equipment;
}

/** Walking is made harder by speed up to this, then by grade; as in the worksheet. */
const fastestWalkMph = 3;
const steepestPercent = 10;
/** Machines that show METs are set in tenths. */
const stepperStep = 0.1;

const gaitOf = ({ modality }: TreadmillSetting): Gait =>
  modality === 'treadmill-run' ? 'run' : 'walk';

const ifInRange = (uptake: Vo2, inRange: boolean): Mets | null => (inRange ? metsOf(uptake) : null);

/** Work of a setting by its equation, METs; null outside the validated range, or where the equation asks for a weight. */
export function metsOfSetting(setting: MachineSetting, weight: Kilograms | null): Mets | null {
  switch (setting.modality) {
    case 'stepper':
      return isMets(setting.mets) ? setting.mets : null;
    case 'step': {
      const { stepsPerMinute, stepHeightMeters } = setting;
      return ifInRange(
        equations.steppingVo2(stepsPerMinute, stepHeightMeters),
        equations.steppingInRange(stepsPerMinute, stepHeightMeters),
      );
    }
    case 'cycle':
      return weight === null
        ? null
        : ifInRange(
            equations.cyclingVo2(setting.powerWatts, weight),
            equations.cyclingPowerInRange(setting.powerWatts),
          );
    case 'arm':
      return weight === null
        ? null
        : ifInRange(
            equations.armCyclingVo2(setting.powerWatts, weight),
            equations.armCyclingPowerInRange(setting.powerWatts),
          );
    default: {
      const speed = speedOfMph(setting.speedMph);
      const gait = gaitOf(setting);
      return ifInRange(
        treadmillVo2(gait, speed, setting.gradePercent / 100),
        treadmillSpeedInRange(gait, speed),
      );
    }
  }
}

/** Speed, mph, at which the gait costs the uptake on a grade; not snapped. */
function speedAt(gait: Gait, uptake: Vo2, gradePercent: number): number {
  const resting = treadmillVo2(gait, metersPerMinute(0), 0);
  const perMeter = treadmillVo2(gait, metersPerMinute(1), gradePercent / 100) - resting;
  return mphOf(metersPerMinute((uptake - resting) / perMeter));
}

/** Runs go by speed alone, on the grade they are on. */
function run(setting: TreadmillSetting, uptake: Vo2, { treadmill }: Equipment): TreadmillSetting {
  const speedMph = snapDown(speedAt('run', uptake, setting.gradePercent), treadmill.speedMph);
  return { ...setting, speedMph };
}

/** A walk is made harder by speed up to 3.0 mph on the grade it is on, then by grade up to 10 %. */
function harderWalk(
  setting: TreadmillSetting,
  uptake: Vo2,
  { treadmill }: Equipment,
): TreadmillSetting {
  const fastest = snapDown(Math.max(setting.speedMph, fastestWalkMph), treadmill.speedMph);
  const wished = snapDown(speedAt('walk', uptake, setting.gradePercent), treadmill.speedMph);
  if (wished < fastest) return { ...setting, speedMph: wished };
  const grade = 100 * equations.walkingGrade(uptake, speedOfMph(fastest));
  const steepest = Math.max(steepestPercent, setting.gradePercent);
  const gradePercent = snapDown(Math.min(grade, steepest), treadmill.gradePercent);
  return { ...setting, speedMph: fastest, gradePercent };
}

/** A walk is made easier by grade, then by speed. */
function easierWalk(
  setting: TreadmillSetting,
  uptake: Vo2,
  { treadmill }: Equipment,
): TreadmillSetting {
  const grade = 100 * equations.walkingGrade(uptake, speedOfMph(setting.speedMph));
  if (grade >= 0) return { ...setting, gradePercent: snapDown(grade, treadmill.gradePercent) };
  const speedMph = snapDown(speedAt('walk', uptake, 0), treadmill.speedMph);
  return { ...setting, speedMph, gradePercent: 0 };
}

function walk(setting: TreadmillSetting, uptake: Vo2, equipment: Equipment): TreadmillSetting {
  const now = treadmillVo2('walk', speedOfMph(setting.speedMph), setting.gradePercent / 100);
  return uptake > now
    ? harderWalk(setting, uptake, equipment)
    : easierWalk(setting, uptake, equipment);
}

function settingAt(
  setting: MachineSetting,
  work: Mets,
  weight: Kilograms | null,
  equipment: Equipment,
): MachineSetting | null {
  const uptake = vo2Of(work);
  switch (setting.modality) {
    case 'stepper':
      return { ...setting, mets: mets(snapDown(work, stepperStep)) };
    case 'step': {
      const rate = equations.steppingRate(uptake, setting.stepHeightMeters);
      return { ...setting, stepsPerMinute: snapDown(rate, 1) };
    }
    case 'cycle': {
      if (weight === null) return null;
      const power = equations.cyclingPower(uptake, weight);
      return { ...setting, powerWatts: watts(snapDown(power, equipment.cycle.power)) };
    }
    case 'arm': {
      if (weight === null) return null;
      const power = equations.armCyclingPower(uptake, weight);
      return { ...setting, powerWatts: watts(snapDown(power, equipment.arm.power)) };
    }
    default:
      return gaitOf(setting) === 'run'
        ? run(setting, uptake, equipment)
        : walk(setting, uptake, equipment);
  }
}

export interface WorkedSetting {
  readonly setting: MachineSetting;
  readonly mets: Mets;
}

/**
 * The setting of the same machine, on its steps, whose work comes nearest to `work` from below.
 * @returns null where no such setting lies in the equation's range, the weight is missing, or the machine's steps allow none
 */
export function settingUpTo(
  setting: MachineSetting,
  work: Mets,
  { weight, equipment }: MachineFacts,
): WorkedSetting | null {
  const found = settingAt(setting, work, weight, equipment);
  const reached = found && metsOfSetting(found, weight);
  if (found === null || reached === null || toMillionths(reached - work) > 0) return null;
  return { setting: found, mets: reached };
}

/** Whether two settings are the same, machine and all. */
export const isSameSetting = (one: MachineSetting, other: MachineSetting): boolean =>
  Object.entries(one).every(([key, value]) =>
    Object.entries(other).some(([itsKey, its]) => itsKey === key && its === value),
  );
