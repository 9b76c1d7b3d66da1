import type { Bpm, Centimeters, Kilograms, Meters, Mets, Range, Vo2 } from '../../units';

export const sexes = ['female', 'male', 'unknown'] as const;
export type SexAtBirth = (typeof sexes)[number];

export const riskLevels = ['low', 'moderate', 'high', 'unknown'] as const;
export type RiskLevel = (typeof riskLevels)[number];

export const rhythms = [
  'sinus',
  'sinus-tracked',
  'sensor-paced',
  'fixed-paced',
  'atrial-fibrillation',
  'atrial-flutter',
  'frequent-ectopy',
  'high-grade-block',
] as const;
export type Rhythm = (typeof rhythms)[number];

export const rateActingDrugs = [
  'beta-blocker',
  'ivabradine',
  'diltiazem-verapamil',
  'digoxin',
  'amiodarone-sotalol',
  'thyroid-hormone',
  'other',
] as const;
export type RateActingDrug = (typeof rateActingDrugs)[number];

export const heartFailures = ['none', 'reduced', 'mildly-reduced', 'preserved', 'unknown'] as const;
export type HeartFailure = (typeof heartFailures)[number];

export const transplants = ['none', 'denervated', 'recovered'] as const;
export type Transplant = (typeof transplants)[number];

export const icdStatuses = ['none', 'present', 'unknown'] as const;
export type IcdStatus = (typeof icdStatuses)[number];

export const icdZoneKinds = ['monitor', 'pacing', 'shock'] as const;
export type IcdZoneKind = (typeof icdZoneKinds)[number];

export const testModes = ['treadmill', 'cycle', 'arm'] as const;
export type TestMode = (typeof testModes)[number];

export const testEndings = [
  'fatigue',
  'dyspnea',
  'angina',
  'st-change',
  'arrhythmia',
  'blood-pressure',
  'claudication',
  'orthopedic',
  'protocol-end',
  'target-rate',
  'other',
] as const;
export type TestEnding = (typeof testEndings)[number];

export const vo2Sources = ['measured', 'estimated'] as const;
export type Vo2Source = (typeof vo2Sources)[number];

export const thresholdKinds = [
  'ischemia',
  'angina',
  'arrhythmia',
  'blood-pressure',
  'symptom',
] as const;
export type ThresholdKind = (typeof thresholdKinds)[number];

export const methods = [
  'heart-rate-reserve',
  'percent-of-peak',
  'observed-work',
  'resting-plus',
  'perceived-exertion',
] as const;
export type Method = (typeof methods)[number];

export const maximumMethods = [
  'measured',
  'fox',
  'tanaka',
  'gellish',
  'nes',
  'gulati',
  'brawner',
  'keteyian',
] as const;
export type MaximumMethod = (typeof maximumMethods)[number];

/** Ends of a range as fractions, 0–1. */
export interface FractionRange {
  readonly lower: number;
  readonly upper: number;
}

/** Ends of a range on the Borg 6–20 scale. */
export interface ExertionRange {
  readonly lower: number;
  readonly upper: number;
}

export interface ExerciseTest {
  readonly mode: TestMode;
  readonly daysAgo: number;
  readonly endedBy: TestEnding;
  /** Whether today's rate-acting drugs and doses are those of the test. */
  readonly sameRateActingDrugs: boolean;
  readonly sameRhythmAndDevice: boolean;
  /** A cardiac event or procedure since. */
  readonly eventSince: boolean;
  readonly restingHeartRate: Bpm | null;
  readonly peakHeartRate: Bpm;
  /** Counts before `peakMets` when both are given. */
  readonly peakVo2: Vo2 | null;
  readonly peakMets: Mets | null;
  readonly vo2Source: Vo2Source;
}

/** A heart rate at which something began, in force until superseded or retired by a physician. */
export interface Threshold {
  readonly kind: ThresholdKind;
  readonly heartRate: Bpm;
  /** The highest work tolerated before onset. */
  readonly clearMets: Mets | null;
}

export interface IcdZone {
  readonly rate: Bpm;
  readonly kind: IcdZoneKind;
}

/** Rates seen at steady work on today's drugs. */
export interface ObservedWork {
  readonly medianHeartRate: Bpm;
  readonly sessions: number;
  readonly perceivedExertion: ExertionRange;
}

export interface Conditions {
  readonly coronaryDisease: boolean;
  readonly heartFailure: HeartFailure;
  readonly transplant: Transplant;
  readonly ventricularAssistDevice: boolean;
  readonly chronotropicIncompetence: boolean;
  readonly autonomicNeuropathy: boolean;
  readonly pulmonaryHypertension: boolean;
  /** Aortic or coronary dissection. */
  readonly dissection: boolean;
  readonly peripheralArteryDisease: boolean;
  /** Outflow obstruction or severe stenosis. */
  readonly outflowObstruction: boolean;
}

/** All that a prescription rests on; null is *not known*, save where it says otherwise. */
export interface PrescriptionRequest {
  readonly patient: {
    readonly ageYears: number;
    readonly sexAtBirth: SexAtBirth;
    readonly heightCm: Centimeters | null;
    readonly weightKg: Kilograms | null;
  };
  readonly resting: {
    readonly seated: Bpm;
    readonly standing: Bpm | null;
    /** Highest less lowest resting rate of the last days; null: not measured. */
    readonly spread: Bpm | null;
  };
  readonly risk: RiskLevel;
  /** 1 is the first week of the program. */
  readonly programWeek: number;
  readonly rhythm: Rhythm;
  /** [] is none; null is not known, and counts as taking. */
  readonly rateActingDrugs: readonly RateActingDrug[] | null;
  readonly conditions: Conditions;
  readonly devices: {
    readonly icd: { readonly status: IcdStatus; readonly zones: readonly IcdZone[] };
    /** Null: no device that tracks. */
    readonly upperTrackingRate: Bpm | null;
  };
  readonly test: ExerciseTest | null;
  readonly thresholds: readonly Threshold[];
  readonly observedWork: ObservedWork | null;
  /** Six-minute walk. */
  readonly walkTest: { readonly distanceMeters: Meters } | null;
  /** Fractions of heart-rate reserve; null takes the policy's. */
  readonly intensity: FractionRange | null;
  /** Fractions of measured peak rate; null takes the policy's. */
  readonly percentOfPeak: FractionRange | null;
  /** Null leaves the choice to the rules. */
  readonly choice: { readonly method: Method | null; readonly maximum: MaximumMethod | null };
}

export type HeartRateRange = Range<Bpm>;
