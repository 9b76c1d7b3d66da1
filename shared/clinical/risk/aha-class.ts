import type { Mets } from '../../units';

export const ahaClasses = ['A', 'B', 'C', 'D'] as const;
/** A: apparently healthy; B: stable disease; C: moderate to high risk; D: unstable. */
export type AhaClass = (typeof ahaClasses)[number];

export interface AhaAdvice {
  readonly supervision: string;
  readonly monitoring: string;
}

export const ahaSource = 'AHA classes: Fletcher 2001 and 2013; the METs of B and C from memory';

export const ahaAdvice: Readonly<Record<AhaClass, AhaAdvice>> = {
  A: { supervision: 'none', monitoring: 'none' },
  B: {
    supervision: 'medical supervision early, then trained staff',
    monitoring: 'usually 6-12 sessions',
  },
  C: {
    supervision: 'medical supervision until safety is shown',
    monitoring: 'continuous until safety established, usually >=12 sessions',
  },
  D: { supervision: 'restore to a better class first', monitoring: 'no conditioning exercise' },
};

/** What the classes ask; null is missing. */
export interface AhaFacts {
  readonly unstable: boolean | null;
  /** Coronary, valve or heart muscle disease. */
  readonly knownDisease: boolean | null;
  readonly nyha: 1 | 2 | 3 | 4 | null;
  /** Percent. */
  readonly ejectionFraction: number | null;
  readonly capacity: Mets | null;
  readonly priorInfarctions: number | null;
  /** Ischemia below 6 METs. */
  readonly ischemiaAtLowWork: boolean | null;
  /** Systolic pressure failing to rise, or falling, below 6 METs. */
  readonly pressureFallAtLowWork: boolean | null;
  readonly priorArrest: boolean | null;
  readonly seriousArrhythmia: boolean | null;
}

const aboveNull = <T>(value: T | null, is: (value: T) => boolean): boolean | null =>
  value === null ? null : is(value);

/** The features of class C; null where missing. */
const severeFeatures = (facts: AhaFacts): readonly (boolean | null)[] => [
  aboveNull(facts.nyha, (nyha) => nyha >= 3),
  aboveNull(facts.ejectionFraction, (percent) => percent <= 30),
  aboveNull(facts.capacity, (capacity) => capacity < 6),
  aboveNull(facts.priorInfarctions, (count) => count >= 2),
  facts.ischemiaAtLowWork,
  facts.pressureFallAtLowWork,
  facts.priorArrest,
  facts.seriousArrhythmia,
];

export interface AhaResult {
  /** Null: what is missing leaves more than one class open. */
  readonly ahaClass: AhaClass | null;
  /** The class to work by: the worst that is left open. */
  readonly treatAs: AhaClass;
}

const settled = (ahaClass: AhaClass): AhaResult => ({ ahaClass, treatAs: ahaClass });

/**
 * AHA class for supervision and monitoring. Missing facts leave the class open and are worked by as the worst: without word on
 * stability nobody exercises.
 * @see ahaSource
 */
export function ahaClassOf(facts: AhaFacts): AhaResult {
  if (facts.unstable === true) return settled('D');
  if (facts.unstable === null) return { ahaClass: null, treatAs: 'D' };
  const features = severeFeatures(facts);
  if (features.includes(true)) return settled('C');
  if (features.includes(null)) return { ahaClass: null, treatAs: 'C' };
  if (facts.knownDisease === null) return { ahaClass: null, treatAs: 'B' };
  return settled(facts.knownDisease ? 'B' : 'A');
}
