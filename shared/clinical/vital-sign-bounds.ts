/**
 * What a reading of the floor may hold, ends included: bpm, mmHg, percent, Borg 6–20. Wide on purpose: they refuse slips of
 * the finger, not sick patients. Borg's scale is 6 to 20 by definition (Borg 1982); the rest is common practice.
 */
export const vitalSignBounds = {
  heartRate: { lowest: 20, highest: 300 },
  systolic: { lowest: 40, highest: 300 },
  diastolic: { lowest: 20, highest: 200 },
  oxygenSaturation: { lowest: 50, highest: 100 },
  perceivedExertion: { lowest: 6, highest: 20 },
} as const;

export type VitalSign = keyof typeof vitalSignBounds;

export const vitalPhases = ['resting', 'exercise', 'recovery'] as const;
export type VitalPhase = (typeof vitalPhases)[number];
