import type { Kilograms, Meters, MetersPerMinute, Vo2, Watts } from '../units';
import { isWithin, metersPerMinute, restingVo2, vo2, watts } from '../units';

/**
 * ACSM metabolic equations: gross steady-state oxygen uptake, mL/kg/min, without handrail support.
 * Formulas and validated ranges: Bushman. ACSM's Health Fitness J 2020;24(4):5–8.
 * A forward function computes anywhere; whether a setting lies in the validated range is asked of `…InRange`.
 */

/** Level and uphill walking, 50–100 m/min; `grade` as a fraction. */
export const walkingVo2 = (speed: MetersPerMinute, grade: number): Vo2 =>
  vo2(restingVo2 + 0.1 * speed + 1.8 * speed * grade);

/** Speed of level walking at an uptake, m/min; at or below rest it is not above zero. */
export const levelWalkingSpeed = (uptake: Vo2): MetersPerMinute =>
  metersPerMinute((uptake - restingVo2) / 0.1);

/** Grade, as a fraction, at which walking at `speed` (above 0) costs the uptake; negative when level costs more. */
export const walkingGrade = (uptake: Vo2, speed: MetersPerMinute): number =>
  (uptake - restingVo2 - 0.1 * speed) / (1.8 * speed);

export const walkingSpeedInRange = (speed: MetersPerMinute): boolean => isWithin(speed, 50, 100);

/** Running, above 134 m/min, or from 80 m/min when the gait is truly a jog; `grade` as a fraction. */
export const runningVo2 = (speed: MetersPerMinute, grade: number): Vo2 =>
  vo2(restingVo2 + 0.2 * speed + 0.9 * speed * grade);

/** Speed of running on the level at an uptake, m/min; at or below rest it is not above zero. */
export const levelRunningSpeed = (uptake: Vo2): MetersPerMinute =>
  metersPerMinute((uptake - restingVo2) / 0.2);

/** Grade, as a fraction, at which running at `speed` (above 0) costs the uptake; negative when level costs more. */
export const runningGrade = (uptake: Vo2, speed: MetersPerMinute): number =>
  (uptake - restingVo2 - 0.2 * speed) / (0.9 * speed);

/** From 80 m/min: whoever runs was seen to run, so the lower end for a true jog holds. */
export const runningSpeedInRange = (speed: MetersPerMinute): boolean => speed >= 80;

const unloadedCyclingVo2 = 7;

/** Leg cycling, 50–200 W; 1 W as 6 kgm/min. */
export const cyclingVo2 = (power: Watts, weight: Kilograms): Vo2 =>
  vo2(unloadedCyclingVo2 + (10.8 * power) / weight);

/** Power of leg cycling at an uptake, W; negative below unloaded cycling. */
export const cyclingPower = (uptake: Vo2, weight: Kilograms): Watts =>
  watts(((uptake - unloadedCyclingVo2) * weight) / 10.8);

export const cyclingPowerInRange = (power: Watts): boolean => isWithin(power, 50, 200);

/** Arm cycling, 25–125 W; 1 W as 6 kgm/min. */
export const armCyclingVo2 = (power: Watts, weight: Kilograms): Vo2 =>
  vo2(restingVo2 + (18 * power) / weight);

/** Power of arm cycling at an uptake, W; negative below rest. */
export const armCyclingPower = (uptake: Vo2, weight: Kilograms): Watts =>
  watts(((uptake - restingVo2) * weight) / 18);

export const armCyclingPowerInRange = (power: Watts): boolean => isWithin(power, 25, 125);

/** Stepping up and down, 12–30 cycles a minute, height 0.04–0.40 m. */
export const steppingVo2 = (cyclesPerMinute: number, height: Meters): Vo2 =>
  vo2(restingVo2 + 0.2 * cyclesPerMinute + 1.33 * 1.8 * height * cyclesPerMinute);

/** Step cycles a minute at an uptake; negative below rest. */
export const steppingRate = (uptake: Vo2, height: Meters): number =>
  (uptake - restingVo2) / (0.2 + 1.33 * 1.8 * height);

export const steppingInRange = (cyclesPerMinute: number, height: Meters): boolean =>
  isWithin(cyclesPerMinute, 12, 30) && isWithin(height, 0.04, 0.4);
