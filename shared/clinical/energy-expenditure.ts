import type { Kilograms, Mets, Minutes, Vo2 } from '../units';
import { restingVo2, vo2, vo2Of } from '../units';

/**
 * Energy by 5 kcal a liter of oxygen, the convention of the ACSM's metabolic calculations (Bushman. ACSM's Health Fitness
 * J 2020;24(4):5–8). The other one in use, 1 MET = 1 kcal/kg/h, gives 4.76 % less: never mix the two.
 */
const kilocaloriesPerLiter = 5;

/** Oxygen uptake of the whole body, L/min, from mL/kg/min and weight, kg. */
export const absoluteVo2 = (uptake: Vo2, weight: Kilograms): number => (uptake * weight) / 1000;

/** Uptake in mL/kg/min from L/min and weight, kg (above 0). */
export const relativeVo2 = (litersPerMinute: number, weight: Kilograms): Vo2 =>
  vo2((litersPerMinute * 1000) / weight);

/** Gross energy, kcal/min; give the net uptake for net energy. */
export const kilocaloriesPerMinute = (uptake: Vo2, weight: Kilograms): number =>
  kilocaloriesPerLiter * absoluteVo2(uptake, weight);

/** Uptake above rest, mL/kg/min: gross less 3.5. */
export const netVo2 = (gross: Vo2): Vo2 => vo2(gross - restingVo2);

/** Gross energy of a bout, kcal. */
export const kilocalories = (work: Mets, weight: Kilograms, time: Minutes): number =>
  kilocaloriesPerMinute(vo2Of(work), weight) * time;
