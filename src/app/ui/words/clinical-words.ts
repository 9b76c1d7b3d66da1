import type {
  HeartFailure,
  IcdStatus,
  IcdZoneKind,
  RateActingDrug,
  Rhythm,
  RiskLevel,
  SexAtBirth,
  TestEnding,
  TestMode,
  ThresholdKind,
  Transplant,
  Vo2Source,
} from '@shared/clinical/prescribing/request';
import type {
  DiagnosisKind,
  EnrollmentStatus,
  PatientFlag,
} from '@shared/contracts/patients-contract';
import type { ClinicalEventKind, ConditionKind } from '@shared/contracts/record-lists';

// What people read for the codes of the contract.

export const diagnosisWords: Readonly<Record<DiagnosisKind, string>> = {
  'heart-attack': 'Heart attack',
  stent: 'Stent',
  bypass: 'Bypass surgery',
  valve: 'Valve operation',
  transplant: 'Heart transplant',
  'stable-angina': 'Stable angina',
  'heart-failure': 'Heart failure',
  'assist-device': 'Ventricular assist device',
  other: 'Other',
};

export const enrollmentStatusWords: Readonly<Record<EnrollmentStatus, string>> = {
  active: 'Running',
  'on-hold': 'On hold',
  completed: 'Completed',
  discontinued: 'Ended early',
};

export const flagWords: Readonly<Record<PatientFlag, string>> = {
  'awaiting-physician': 'Awaits a physician',
  'range-withdrawn': 'Range withdrawn',
  'no-range': 'No range yet',
  'review-due': 'Review due',
  'on-hold': 'On hold',
  'no-course': 'No course',
};

export const sexWords: Readonly<Record<SexAtBirth, string>> = {
  female: 'Female',
  male: 'Male',
  unknown: 'Not known',
};

export const riskWords: Readonly<Record<RiskLevel, string>> = {
  low: 'Low risk',
  moderate: 'Moderate risk',
  high: 'High risk',
  unknown: 'Risk not known',
};

export const rhythmWords: Readonly<Record<Rhythm, string>> = {
  sinus: 'Sinus rhythm',
  'sinus-tracked': 'Sinus, tracked by a pacemaker',
  'sensor-paced': 'Paced by a rate sensor',
  'fixed-paced': 'Paced at a fixed rate',
  'atrial-fibrillation': 'Atrial fibrillation',
  'atrial-flutter': 'Atrial flutter',
  'frequent-ectopy': 'Frequent ectopy',
  'high-grade-block': 'High-grade AV block',
};

export const rateActingWords: Readonly<Record<RateActingDrug, string>> = {
  'beta-blocker': 'Beta blocker',
  ivabradine: 'Ivabradine',
  'diltiazem-verapamil': 'Diltiazem or verapamil',
  digoxin: 'Digoxin',
  'amiodarone-sotalol': 'Amiodarone or sotalol',
  'thyroid-hormone': 'Thyroid hormone',
  other: 'Other, acts on the rate',
};

export const conditionWords: Readonly<Record<ConditionKind, string>> = {
  coronaryDisease: 'Coronary disease',
  heartFailure: 'Heart failure',
  transplant: 'Heart transplant',
  ventricularAssistDevice: 'Ventricular assist device',
  chronotropicIncompetence: 'Chronotropic incompetence',
  autonomicNeuropathy: 'Autonomic neuropathy',
  pulmonaryHypertension: 'Pulmonary hypertension',
  dissection: 'Aortic or coronary dissection',
  peripheralArteryDisease: 'Peripheral artery disease',
  outflowObstruction: 'Outflow obstruction or severe stenosis',
};

const heartFailureWords: Readonly<Record<HeartFailure, string>> = {
  none: 'None',
  reduced: 'Reduced ejection fraction',
  'mildly-reduced': 'Mildly reduced ejection fraction',
  preserved: 'Preserved ejection fraction',
  unknown: 'Kind not known',
};

const transplantWords: Readonly<Record<Transplant, string>> = {
  none: 'None',
  denervated: 'Yes, heart denervated',
  recovered: 'Yes, heart rate responds again',
};

const yesNoWords: Readonly<Record<string, string>> = { yes: 'Yes', no: 'No' };

/** The words of a condition's answer. */
export function conditionAnswerWords(kind: ConditionKind): Readonly<Record<string, string>> {
  if (kind === 'heartFailure') return heartFailureWords;
  return kind === 'transplant' ? transplantWords : yesNoWords;
}

export const eventWords: Readonly<Record<ClinicalEventKind, string>> = {
  'heart-attack': 'Heart attack',
  stent: 'Stent',
  bypass: 'Bypass surgery',
  valve: 'Valve operation',
  transplant: 'Transplant',
  'device-implant': 'Device implanted',
  ablation: 'Ablation',
  cardioversion: 'Cardioversion',
  arrhythmia: 'Arrhythmia',
  syncope: 'Fainted (syncope)',
  'heart-failure-worse': 'Heart failure got worse',
  'hospital-stay': 'Hospital stay',
  other: 'Other event or procedure',
};

export const icdWords: Readonly<Record<IcdStatus, string>> = {
  none: 'No defibrillator',
  present: 'Defibrillator (ICD)',
  unknown: 'Defibrillator not known',
};

export const zoneWords: Readonly<Record<IcdZoneKind, string>> = {
  monitor: 'Monitor',
  pacing: 'Pacing (ATP)',
  shock: 'Shock',
};

export const testModeWords: Readonly<Record<TestMode, string>> = {
  treadmill: 'Treadmill',
  cycle: 'Cycle',
  arm: 'Arm ergometer',
};

export const testEndWords: Readonly<Record<TestEnding, string>> = {
  fatigue: 'Fatigue',
  dyspnea: 'Shortness of breath',
  angina: 'Angina',
  'st-change': 'ST change',
  arrhythmia: 'Arrhythmia',
  'blood-pressure': 'Blood pressure',
  claudication: 'Claudication',
  orthopedic: 'Joint or muscle',
  'protocol-end': 'End of the protocol',
  'target-rate': 'Target rate reached',
  other: 'Other',
};

export const vo2SourceWords: Readonly<Record<Vo2Source, string>> = {
  measured: 'Measured (gas exchange)',
  estimated: 'Estimated from the work',
};

export const thresholdWords: Readonly<Record<ThresholdKind, string>> = {
  ischemia: 'Ischemia (ST change)',
  angina: 'Angina',
  arrhythmia: 'Arrhythmia',
  'blood-pressure': 'Blood pressure',
  symptom: 'Symptom',
};
