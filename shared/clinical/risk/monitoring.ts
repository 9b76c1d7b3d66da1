import type { RiskClass } from './criteria';

export interface MonitoringAdvice {
  /** Sessions with continuous ECG, then less as the patient stays safe. */
  readonly sessions: { readonly lower: number; readonly upper: number };
  readonly text: string;
}

export const monitoringSource =
  'AACVPR guidance on ECG monitoring by risk; from memory. Local policy and the physician’s orders prevail.';

/** Continuous ECG by risk class. The AHA's classes have numbers of their own: the two are different scales. */
export const monitoringAdvice: Readonly<Record<RiskClass, MonitoringAdvice>> = {
  low: {
    sessions: { lower: 6, upper: 18 },
    text: 'Continuous ECG for the first 6 to 18 sessions, then intermittent.',
  },
  moderate: {
    sessions: { lower: 12, upper: 24 },
    text: 'Continuous ECG for the first 12 to 24 sessions, then intermittent as the patient stays safe.',
  },
  high: {
    sessions: { lower: 18, upper: 36 },
    text: 'Continuous ECG for 18 to 36 sessions or more, as the patient stays safe.',
  },
};
