import type { Meters } from '../units';
import { meters } from '../units';

/** The smallest change of a six-minute walk that matters to patients, by condition, with its source. */
export const importantWalkChanges = {
  'coronary-disease': { least: meters(25), source: 'Gremeaux 2011, coronary disease' },
  'heart-failure': { least: meters(36), source: 'Täger 2014, chronic heart failure' },
  general: {
    least: meters(30),
    source: 'ERS/ATS 2014, chronic respiratory disease; from memory',
  },
} as const;
export type WalkCondition = keyof typeof importantWalkChanges;

export interface WalkChange {
  /** Last less first, m; negative is a loss. */
  readonly change: Meters;
  readonly least: Meters;
  readonly important: 'gain' | 'loss' | 'none';
  readonly source: string;
}

/** A change against the least that matters in the condition; the least itself counts. */
export function judgeWalkChange(first: Meters, last: Meters, condition: WalkCondition): WalkChange {
  const { least, source } = importantWalkChanges[condition];
  const change = meters(last - first);
  const important = Math.abs(change) < least ? 'none' : change > 0 ? 'gain' : 'loss';
  return { change, least, important, source };
}
