import { isWithin, quantity } from './quantity';
import type { Quantity } from './quantity';
import { formatInward } from './rounding';

/** Oxygen uptake, mL/kg/min, gross. */
export type Vo2 = Quantity<'mL/kg/min'>;

/** Metabolic equivalents of task. */
export type Mets = Quantity<'MET'>;

/** One MET, and the resting uptake, by convention: 3.5 mL/kg/min. */
export const restingVo2 = 3.5 as Vo2;

export const vo2 = quantity<Vo2>('oxygen uptake (mL/kg/min)');
export const mets = quantity<Mets>('METs');

/** Whether a value can be a person's peak oxygen uptake: 4–80 mL/kg/min. */
export const isVo2 = (value: unknown): value is Vo2 => isWithin(value, 4, 80);

/** Whether a value can be a person's work: 1–25 METs. */
export const isMets = (value: unknown): value is Mets => isWithin(value, 1, 25);

export const metsOf = (uptake: Vo2): Mets => mets(uptake / restingVo2);
export const vo2Of = (work: Mets): Vo2 => vo2(work * restingVo2);

/** One decimal, rounded toward the inside of its range. */
export const formatMets = (work: Mets, end: 'lower' | 'upper'): string =>
  `${formatInward(work, 1, end)} METs`;

/** One decimal, rounded toward the inside of its range. */
export const formatVo2 = (uptake: Vo2, end: 'lower' | 'upper'): string =>
  `${formatInward(uptake, 1, end)} mL/kg/min`;
