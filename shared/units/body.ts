import { isWithin, quantity } from './quantity';
import type { Quantity } from './quantity';

/** Body weight, kilograms. */
export type Kilograms = Quantity<'kg'>;

/** Body height, centimeters. */
export type Centimeters = Quantity<'cm'>;

export const kilograms = quantity<Kilograms>('weight (kg)');
export const centimeters = quantity<Centimeters>('height (cm)');

/** Whether a value can be an adult's weight: 25–350 kg. */
export const isKilograms = (value: unknown): value is Kilograms => isWithin(value, 25, 350);

/** Whether a value can be an adult's height: 100–250 cm. */
export const isCentimeters = (value: unknown): value is Centimeters => isWithin(value, 100, 250);

/** The international avoirdupois pound, exact. */
const kilogramsPerPound = 0.45359237;

/** The international inch, exact. */
const centimetersPerInch = 2.54;

export const kilogramsOfPounds = (pounds: number): Kilograms =>
  kilograms(pounds * kilogramsPerPound);
export const poundsOf = (weight: Kilograms): number => weight / kilogramsPerPound;
export const centimetersOfInches = (inches: number): Centimeters =>
  centimeters(inches * centimetersPerInch);
export const inchesOf = (height: Centimeters): number => height / centimetersPerInch;

/** One decimal. */
export const formatKilograms = (weight: Kilograms): string => `${weight.toFixed(1)} kg`;

export const formatCentimeters = (height: Centimeters): string => `${height.toFixed(0)} cm`;
