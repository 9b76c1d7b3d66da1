import type { Kilograms, Mets, MetersPerMinute, Vo2, Watts } from '../../units';
import { metsOf, restingVo2, speedOfMph, vo2 } from '../../units';
import type { Gait } from '../gait';
import { equationSource, treadmillSpeedInRange, treadmillVo2 } from '../gait';
import { cyclingPowerInRange, cyclingVo2 } from '../metabolic-equations';
import type { TreadmillSetting } from './ramps';

/** Work of a stage by the metabolic equation. */
export interface StageWork {
  readonly vo2: Vo2;
  readonly mets: Mets;
  /** Outside it the number is an extrapolation, and is said to be one. */
  readonly withinEquationRange: boolean;
  readonly source: string;
}

const workOf = (uptake: Vo2, withinEquationRange: boolean): StageWork => ({
  vo2: uptake,
  mets: metsOf(uptake),
  withinEquationRange,
  source: equationSource,
});

/** Work of a treadmill stage by the equation of the gait that was seen; without handrail and at steady state. */
export function treadmillStageWork(
  { speedMph, gradePercent }: TreadmillSetting,
  gait: Gait,
): StageWork {
  const speed = speedOfMph(speedMph);
  return workOf(treadmillVo2(gait, speed, gradePercent / 100), treadmillSpeedInRange(gait, speed));
}

/** Work of a cycle stage. */
export const cycleStageWork = (power: Watts, weight: Kilograms): StageWork =>
  workOf(cyclingVo2(power, weight), cyclingPowerInRange(power));

/**
 * Peak uptake from the equation's uptake at the last stage, which runs high: 0.869 × equation − 0.07 without,
 * 0.694 × equation + 3.33 with handrail support, mL/kg/min.
 * @see Foster et al. Med Sci Sports Exerc 1996;28:752–756
 */
export const fosterPeakVo2 = (equation: Vo2, handrail: boolean): Vo2 =>
  vo2(handrail ? 0.694 * equation + 3.33 : 0.869 * equation - 0.07);

/**
 * Peak uptake from the last treadmill setting: speed × (0.17 + 0.79 grade) + 3.5, mL/kg/min, from tests with measured gas.
 * @param grade as a fraction
 * @see Kokkinos et al., FRIEND registry, 2017
 */
export const kokkinosPeakVo2 = (speed: MetersPerMinute, grade: number): Vo2 =>
  vo2(speed * (0.17 + 0.79 * grade) + restingVo2);
