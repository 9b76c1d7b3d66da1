import type { MetersPerMinute, Vo2 } from '../units';
import {
  runningSpeedInRange,
  runningVo2,
  walkingSpeedInRange,
  walkingVo2,
} from './metabolic-equations';

export const gaits = ['walk', 'run'] as const;
/** How the patient moves on the treadmill: seen and chosen, never guessed from speed. */
export type Gait = (typeof gaits)[number];

interface GaitEquation {
  readonly vo2: (speed: MetersPerMinute, grade: number) => Vo2;
  readonly inRange: (speed: MetersPerMinute) => boolean;
}

const equations: Readonly<Record<Gait, GaitEquation>> = {
  walk: { vo2: walkingVo2, inRange: walkingSpeedInRange },
  run: { vo2: runningVo2, inRange: runningSpeedInRange },
};

/**
 * Oxygen uptake on the treadmill by the equation of the gait, mL/kg/min. The two disagree: 4.2 mph at 16 % is 13.5 METs walked
 * and 12.1 METs run.
 * @param grade as a fraction
 */
export const treadmillVo2 = (gait: Gait, speed: MetersPerMinute, grade: number): Vo2 =>
  equations[gait].vo2(speed, grade);

/** Whether the speed lies in the validated range of the gait's equation. */
export const treadmillSpeedInRange = (gait: Gait, speed: MetersPerMinute): boolean =>
  equations[gait].inRange(speed);

export const equationModalities = [
  'treadmill-walk',
  'treadmill-run',
  'cycle',
  'arm',
  'step',
] as const;
export type EquationModality = (typeof equationModalities)[number];

/** One setting of an equation and the range in which it was validated. */
interface ValidatedRange {
  readonly setting: 'speed' | 'power' | 'rate' | 'height';
  readonly unit: 'm/min' | 'W' | '/min' | 'm';
  readonly lowest: number;
  /** Null: no upper end was published. */
  readonly highest: number | null;
}

export interface MetabolicEquation {
  readonly modality: EquationModality;
  readonly formula: string;
  readonly ranges: readonly ValidatedRange[];
  /** What a reader must know besides the range. */
  readonly note: string | null;
}

/** Where all equations come from. */
export const equationSource =
  'ACSM metabolic equations, gross and at steady state: Bushman, ACSM’s Health Fitness J 2020;24(4):5–8.';

/** A hand on the rail carries weight: the equations then overstate the work. */
export const handrailNote =
  'Holding the handrail makes the work lighter than the equation says: a light touch for balance only, or lower the expected METs. Peak uptake by Foster 1996 is then 0.694 × equation + 3.33 mL/kg/min.';

/** The equations with the range of each, for people to see. */
export const metabolicEquations: readonly MetabolicEquation[] = [
  {
    modality: 'treadmill-walk',
    formula: '3.5 + 0.1 S + 1.8 S G',
    ranges: [{ setting: 'speed', unit: 'm/min', lowest: 50, highest: 100 }],
    note: '1.9 to 3.7 mph. Walking or running is chosen by the gait that is seen, not by speed.',
  },
  {
    modality: 'treadmill-run',
    formula: '3.5 + 0.2 S + 0.9 S G',
    ranges: [{ setting: 'speed', unit: 'm/min', lowest: 80, highest: null }],
    note: 'Above 134 m/min (5 mph); from 80 m/min (3 mph) only when the patient truly jogs.',
  },
  {
    modality: 'cycle',
    formula: '7 + 10.8 W / kg',
    ranges: [{ setting: 'power', unit: 'W', lowest: 50, highest: 200 }],
    note: null,
  },
  {
    modality: 'arm',
    formula: '3.5 + 18 W / kg',
    ranges: [{ setting: 'power', unit: 'W', lowest: 25, highest: 125 }],
    note: null,
  },
  {
    modality: 'step',
    formula: '3.5 + 0.2 f + 1.33 × 1.8 H f',
    ranges: [
      { setting: 'rate', unit: '/min', lowest: 12, highest: 30 },
      { setting: 'height', unit: 'm', lowest: 0.04, highest: 0.4 },
    ],
    note: 'f counts whole cycles: both feet up and down is one.',
  },
];
