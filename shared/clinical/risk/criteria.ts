import type { Mets } from '../../units';

export const riskClasses = ['low', 'moderate', 'high'] as const;
/** Risk of an event during exercise, from least to most. */
export type RiskClass = (typeof riskClasses)[number];

/** The findings that someone ticks or leaves unticked. */
export const riskFindings = {
  complexArrhythmia: {
    raises: 'high',
    label: 'Complex ventricular arrhythmia at rest, in the test or in recovery',
    evidence: 'seen',
  },
  symptomsAtLowWork: {
    raises: 'high',
    label: 'Angina or other marked symptoms below 5 METs or in recovery',
    evidence: 'memory',
  },
  symptomsAtHigherWork: {
    raises: 'moderate',
    label: 'Angina or other marked symptoms, only at 5 METs or more',
    evidence: 'memory',
  },
  chronotropicIncompetence: {
    raises: 'high',
    label: 'Chronotropic incompetence',
    evidence: 'memory',
  },
  pressureFailsToRise: {
    raises: 'high',
    label: 'Systolic pressure flat or falling as work rises',
    evidence: 'memory',
  },
  pressureFallsAfter: {
    raises: 'high',
    label: 'Severe hypotension after exercise',
    evidence: 'memory',
  },
  markedIschemia: {
    raises: 'high',
    label: 'Silent ischemia, ST depression of 2 mm or more',
    evidence: 'memory',
  },
  mildIschemia: {
    raises: 'moderate',
    label: 'Silent ischemia, ST depression under 2 mm',
    evidence: 'memory',
  },
  cardiacArrest: { raises: 'high', label: 'Cardiac arrest in the past', evidence: 'memory' },
  complicatedEvent: {
    raises: 'high',
    label: 'Complicated infarction or procedure',
    evidence: 'memory',
  },
  heartFailure: { raises: 'high', label: 'Heart failure', evidence: 'memory' },
  ischemiaSinceEvent: {
    raises: 'high',
    label: 'Ischemia since the event or procedure',
    evidence: 'memory',
  },
  depression: { raises: 'high', label: 'Clinical depression', evidence: 'memory' },
  implantedDefibrillator: {
    raises: 'high',
    label: 'Implanted defibrillator',
    evidence: 'memory',
  },
} as const satisfies Readonly<
  Record<
    string,
    {
      /** What it makes of the risk when it is there. */
      readonly raises: Exclude<RiskClass, 'low'>;
      readonly label: string;
      /** Whether the wording was read in a reprint or is recalled. */
      readonly evidence: 'seen' | 'memory';
    }
  >
>;
export type RiskFinding = keyof typeof riskFindings;

/** The criteria that are numbers. */
export const riskNumbers = {
  ejectionFraction: { label: 'Resting ejection fraction', unit: '%' },
  capacity: { label: 'Exercise capacity', unit: 'METs' },
} as const;
export type RiskNumber = keyof typeof riskNumbers;

export type RiskCriterion = RiskFinding | RiskNumber;

/** What is known of a patient: true is ticked, false was looked for and is not there, null is missing. */
export interface RiskFacts {
  readonly findings: Readonly<Record<RiskFinding, boolean | null>>;
  /** Percent. */
  readonly ejectionFraction: number | null;
  /** Of a test; an estimate counts, marked as one elsewhere. */
  readonly capacity: Mets | null;
}

export const riskSource =
  'AACVPR stratification for events during exercise, as reprinted in PMC8006124, Table 3; parts from memory. It predicts modestly (AUC 0.64, Bhat 2021).';
