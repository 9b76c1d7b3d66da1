import * as z from 'zod';
import type { PrescriptionPolicy } from '../clinical/prescribing';
import { policyBounds } from '../clinical/prescribing';
import type { Bpm, Meters, MmHg, Watts } from '../units';
import { rangeWithin, strict, within } from './quantities';

const at = policyBounds;

const margin = (label: string) => within<Bpm>(`Margin for ${label}`, at.margin, 'bpm');

const restingPlus = strict('Resting plus', {
  lower: within<Bpm>('Resting plus, lower end', at.restingPlus, 'bpm'),
  upper: within<Bpm>('Resting plus, upper end', at.restingPlus, 'bpm'),
  cap: within<Bpm>('Cap of resting plus', at.restingPlusCap, 'bpm'),
}).refine(({ lower, upper }) => lower < upper, {
  path: ['upper'],
  message: 'Resting plus: the upper end must be above the lower end.',
});

const step = strict('Steps', {
  lowest: within<Meters>('Lowest step', at.stepHeight, 'm'),
  highest: within<Meters>('Highest step', at.stepHeight, 'm'),
  by: within<Meters>('Difference between steps', at.stepHeightStep, 'm'),
}).refine(({ lowest, highest }) => lowest <= highest, {
  path: ['highest'],
  message: 'The highest step must not be below the lowest.',
});

const equipment = strict('Equipment', {
  treadmill: strict('Treadmill', {
    speedMph: within('Step of the treadmill speed', at.treadmillSpeedStep, 'mph'),
    gradePercent: within('Step of the treadmill grade', at.treadmillGradeStep, '%'),
  }),
  cycle: strict('Cycle', { power: within<Watts>('Step of the cycle', at.powerStep, 'W') }),
  arm: strict('Arm ergometer', {
    power: within<Watts>('Step of the arm ergometer', at.powerStep, 'W'),
  }),
  step,
});

/** A program's policy, within the bounds that it may set. */
export const prescriptionPolicySchema: z.ZodType<PrescriptionPolicy, unknown> = strict('Policy', {
  version: z.int().min(1, 'A policy version is a whole number from 1.'),
  intensity: strict('Intensity', {
    wide: rangeWithin('Wide intensity', at.intensity),
    narrow: rangeWithin('Narrow intensity', at.intensity),
    lowCapacity: rangeWithin('Intensity for low capacity', at.intensity),
  }),
  percentOfPeak: rangeWithin('Percent of peak', at.percentOfPeak),
  restingPlus,
  margin: strict('Margins', {
    ischemia: margin('ischemia'),
    angina: margin('angina'),
    arrhythmia: margin('arrhythmia'),
    bloodPressure: margin('blood pressure'),
    symptom: margin('symptoms'),
    icd: margin('an ICD'),
    tracking: margin('the tracking rate'),
  }),
  askLine: strict('Ask line', { above: within<Bpm>('Ask line', at.askLineAbove, 'bpm') }),
  range: strict('Range', {
    minimumWidth: within<Bpm>('Smallest width of a range', at.minimumWidth, 'bpm'),
  }),
  reserve: strict('Reserve', {
    minimum: within<Bpm>('Smallest reserve', at.reserveMinimum, 'bpm'),
  }),
  resting: strict('Resting rate', {
    maximumSpread: within<Bpm>('Largest spread of the resting rate', at.maximumSpread, 'bpm'),
  }),
  test: strict('Test', { validDays: within('Days a test is valid', at.testValidDays) }),
  reviewDueDays: within('Days until a review is due', at.reviewDueDays),
  arm: strict('Arm work', {
    rateBelowLegs: within<Bpm>('Arm rate below legs', at.armRateBelowLegs, 'bpm'),
    workFraction: within('Arm work as a fraction of leg work', at.armWorkFraction),
  }),
  walk: strict('Walk', {
    startFraction: within('Start as a fraction of walking speed', at.walkStartFraction),
  }),
  pressureCeiling: strict('Pressure ceiling', {
    systolic: within<MmHg>('Systolic ceiling', at.systolicCeiling, 'mmHg'),
    diastolic: within<MmHg>('Diastolic ceiling', at.diastolicCeiling, 'mmHg'),
  }),
  oxygenFloor: within('Oxygen floor', at.oxygenFloor, '%'),
  equipment,
});
