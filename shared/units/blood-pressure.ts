import { isWithin, quantity } from './quantity';
import type { Quantity } from './quantity';

/** Blood pressure, millimeters of mercury. */
export type MmHg = Quantity<'mm[Hg]'>;

export interface BloodPressure {
  readonly systolic: MmHg;
  readonly diastolic: MmHg;
}

export const mmHg = quantity<MmHg>('blood pressure (mmHg)');

/** Whether a value can be a blood pressure: 20–350 mmHg. */
export const isMmHg = (value: unknown): value is MmHg => isWithin(value, 20, 350);

export const formatBloodPressure = ({ systolic, diastolic }: BloodPressure): string =>
  `${Number(systolic)}/${Number(diastolic)} mmHg`;
