import type { Bpm, MmHg } from '../units';

/**
 * Rate–pressure product: heart rate × systolic pressure, bpm × mmHg; often printed divided by 1000.
 * @see from memory of exercise-testing texts
 */
export const ratePressureProduct = (rate: Bpm, systolic: MmHg): number => rate * systolic;
