import type { BloodPressure, Bpm, Meters, Watts } from '../../units';
import { bpm, meters, mmHg, watts } from '../../units';
import type { FractionRange, ThresholdKind } from './request';

/** What a program may set; a version, once used, never changes. Sources stand beside the defaults. */
export interface PrescriptionPolicy {
  /** A whole number from 1. */
  readonly version: number;
  /** Fractions of heart-rate reserve. */
  readonly intensity: {
    readonly wide: FractionRange;
    readonly narrow: FractionRange;
    readonly lowCapacity: FractionRange;
  };
  /** Fractions of measured peak rate. */
  readonly percentOfPeak: FractionRange;
  readonly restingPlus: { readonly lower: Bpm; readonly upper: Bpm; readonly cap: Bpm };
  /** How far below a threshold the ceiling stays. */
  readonly margin: Readonly<Record<MarginKey, Bpm>>;
  /** With no ceiling: how far above the target the floor asks. */
  readonly askLine: { readonly above: Bpm };
  readonly range: { readonly minimumWidth: Bpm };
  readonly reserve: { readonly minimum: Bpm };
  readonly resting: { readonly maximumSpread: Bpm };
  readonly test: { readonly validDays: number };
  readonly reviewDueDays: number;
  readonly arm: { readonly rateBelowLegs: Bpm; readonly workFraction: number };
  readonly walk: { readonly startFraction: number };
  readonly pressureCeiling: BloodPressure;
  /** Oxygen saturation, percent. */
  readonly oxygenFloor: number;
  readonly equipment: Equipment;
}

export type MarginKey =
  'ischemia' | 'angina' | 'arrhythmia' | 'bloodPressure' | 'symptom' | 'icd' | 'tracking';

/** The steps in which the program's machines are set. */
export interface Equipment {
  readonly treadmill: { readonly speedMph: number; readonly gradePercent: number };
  readonly cycle: { readonly power: Watts };
  readonly arm: { readonly power: Watts };
  readonly step: { readonly lowest: Meters; readonly highest: Meters; readonly by: Meters };
}

export const marginKeyOf: Readonly<Record<ThresholdKind, MarginKey>> = {
  ischemia: 'ischemia',
  angina: 'angina',
  arrhythmia: 'arrhythmia',
  'blood-pressure': 'bloodPressure',
  symptom: 'symptom',
};

/**
 * Version 1, the published defaults.
 * - intensity: ACSM range for cardiac patients, 40–80 % of reserve (UK practice 40–70 %).
 * - percentOfPeak: between ACSM's moderate band and the heart-failure range of the Canadian Cardiovascular Society, 2013.
 * - restingPlus: common practice; the cap is an inpatient convention, from memory.
 * - margin: ACSM; icd 10–15 in U.S. texts, 20 in the European position paper (Piepoli 2010); tracking from memory.
 * - askLine, test.validDays: common practice. range, reserve, resting: our own, for legibility and reliability.
 * - reviewDueDays: plan review, 42 CFR 410.49.
 * - arm: reviews of upper-body training; the rate from memory. walk: practice varies, from memory.
 * - pressureCeiling: dissection review, PMC9741551. oxygenFloor: policies differ between 85 and 90 %.
 * - equipment: the steps of common machines.
 */
export const defaultPolicy: PrescriptionPolicy = {
  version: 1,
  intensity: {
    wide: { lower: 0.4, upper: 0.8 },
    narrow: { lower: 0.4, upper: 0.6 },
    lowCapacity: { lower: 0.3, upper: 0.6 },
  },
  percentOfPeak: { lower: 0.65, upper: 0.8 },
  restingPlus: { lower: bpm(20), upper: bpm(30), cap: bpm(120) },
  margin: {
    ischemia: bpm(10),
    angina: bpm(10),
    arrhythmia: bpm(10),
    bloodPressure: bpm(10),
    symptom: bpm(10),
    icd: bpm(10),
    tracking: bpm(10),
  },
  askLine: { above: bpm(10) },
  range: { minimumWidth: bpm(5) },
  reserve: { minimum: bpm(25) },
  resting: { maximumSpread: bpm(10) },
  test: { validDays: 180 },
  reviewDueDays: 30,
  arm: { rateBelowLegs: bpm(10), workFraction: 0.45 },
  walk: { startFraction: 0.7 },
  pressureCeiling: { systolic: mmHg(150), diastolic: mmHg(90) },
  oxygenFloor: 88,
  equipment: {
    treadmill: { speedMph: 0.1, gradePercent: 0.5 },
    cycle: { power: watts(5) },
    arm: { power: watts(5) },
    step: { lowest: meters(0.1), highest: meters(0.3), by: meters(0.05) },
  },
};

/**
 * Within what a program may change its policy, ends included. The bounds of range, reserve, resting,
 * pressureCeiling, oxygenFloor and equipment are our own.
 */
export const policyBounds = {
  intensity: { lowest: 0.2, highest: 0.9 },
  percentOfPeak: { lowest: 0.5, highest: 0.9 },
  restingPlus: { lowest: 10, highest: 30 },
  restingPlusCap: { lowest: 100, highest: 140 },
  margin: { lowest: 10, highest: 30 },
  askLineAbove: { lowest: 5, highest: 20 },
  minimumWidth: { lowest: 4, highest: 20 },
  reserveMinimum: { lowest: 10, highest: 50 },
  maximumSpread: { lowest: 5, highest: 30 },
  testValidDays: { lowest: 30, highest: 365 },
  reviewDueDays: { lowest: 7, highest: 90 },
  armRateBelowLegs: { lowest: 5, highest: 15 },
  armWorkFraction: { lowest: 0.3, highest: 0.6 },
  walkStartFraction: { lowest: 0.5, highest: 0.9 },
  systolicCeiling: { lowest: 100, highest: 180 },
  diastolicCeiling: { lowest: 60, highest: 110 },
  oxygenFloor: { lowest: 85, highest: 94 },
  treadmillSpeedStep: { lowest: 0.1, highest: 0.5 },
  treadmillGradeStep: { lowest: 0.1, highest: 2.5 },
  powerStep: { lowest: 1, highest: 25 },
  stepHeight: { lowest: 0.04, highest: 0.4 },
  stepHeightStep: { lowest: 0.01, highest: 0.1 },
} as const;
