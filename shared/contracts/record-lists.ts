import { heartFailures, transplants } from '../clinical/prescribing/request';

/** The keys of the evaluate request's `conditions`. */
export const conditionKinds = [
  'coronaryDisease',
  'heartFailure',
  'transplant',
  'ventricularAssistDevice',
  'chronotropicIncompetence',
  'autonomicNeuropathy',
  'pulmonaryHypertension',
  'dissection',
  'peripheralArteryDisease',
  'outflowObstruction',
] as const;
export type ConditionKind = (typeof conditionKinds)[number];

const yesNo: readonly string[] = ['yes', 'no'];

/** What may be answered to each condition; the graded ones have their grades. */
export const conditionAnswers: Readonly<Record<ConditionKind, readonly string[]>> = {
  coronaryDisease: yesNo,
  heartFailure: heartFailures,
  transplant: transplants,
  ventricularAssistDevice: yesNo,
  chronotropicIncompetence: yesNo,
  autonomicNeuropathy: yesNo,
  pulmonaryHypertension: yesNo,
  dissection: yesNo,
  peripheralArteryDisease: yesNo,
  outflowObstruction: yesNo,
};

/** Events, procedures and stays after which a test no longer stands. */
export const clinicalEventKinds = [
  'heart-attack',
  'stent',
  'bypass',
  'valve',
  'transplant',
  'device-implant',
  'ablation',
  'cardioversion',
  'arrhythmia',
  'syncope',
  'heart-failure-worse',
  'hospital-stay',
  'other',
] as const;
export type ClinicalEventKind = (typeof clinicalEventKinds)[number];
