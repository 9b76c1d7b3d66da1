import type { FloorFlag, SymptomCode } from '@shared/contracts/floor-contract';
import type { LimitKind } from '@shared/clinical/prescribing';
import type { VitalPhase, VitalSign } from '@shared/clinical/vital-sign-bounds';
import type { RosterItem } from '@shared/contracts/floor-contract';

export const phaseWords: Readonly<Record<VitalPhase, string>> = {
  resting: 'Resting',
  exercise: 'Exercise',
  recovery: 'Recovery',
};

export const signWords: Readonly<Record<VitalSign, string>> = {
  heartRate: 'Heart rate',
  systolic: 'Systolic pressure',
  diastolic: 'Diastolic pressure',
  perceivedExertion: 'Effort 6–20',
  oxygenSaturation: 'Oxygen',
};

export const symptomWords: Readonly<Record<SymptomCode, string>> = {
  none: 'None',
  'chest-discomfort': 'Chest discomfort',
  'shortness-of-breath': 'Shortness of breath',
  dizziness: 'Dizziness',
  palpitations: 'Palpitations',
  'leg-pain': 'Leg pain',
  'unusual-fatigue': 'Unusual fatigue',
  nausea: 'Nausea',
};

/** A symptom that another program sent may be in words of its own. */
export const symptomText = (code: string): string =>
  (symptomWords as Readonly<Record<string, string>>)[code] ?? code;

/** Symptoms in a row, '' when none was told of. */
export const symptomsText = (symptoms: readonly string[]): string =>
  symptoms
    .filter((code) => code !== 'none')
    .map(symptomText)
    .join(', ');

/** Why the ceiling stands, in a word. */
const limitWords: Readonly<Record<LimitKind, string>> = {
  ischemia: 'ischemia',
  angina: 'angina',
  arrhythmia: 'arrhythmia',
  'blood-pressure': 'blood pressure',
  symptom: 'a symptom',
  icd: 'the ICD',
  tracking: 'the upper tracking rate',
};

export const ceilingReason = (ceiling: NonNullable<RosterItem['ceiling']>): string =>
  ceiling.bindingLimits.map((kind) => limitWords[kind]).join(', ');

export const flagWords: Readonly<Record<FloorFlag, string>> = {
  'range-changed': 'range changed since',
  pacemaker: 'pacemaker',
  'irregular-rhythm': 'irregular rhythm',
  insulin: 'insulin',
};

export const rangeText = ({ lower, upper }: { lower: number; upper: number }): string =>
  `${lower}–${upper}`;
