/** How far a score must move before it means something, with the source of each number. */
export const scoreChanges = {
  'phq-9': {
    important: 5,
    importantSource: 'Löwe 2004, from memory; Kounali 2022: about 20 % in moderate depression',
    reliable: 6,
    reliableSource: 'UK talking-therapy services, from memory',
  },
  'gad-7': {
    important: 4,
    importantSource: 'Toussaint 2020; the number from memory',
    reliable: 4,
    reliableSource: 'UK talking-therapy services, from memory',
  },
} as const;
export type ChangeQuestionnaire = keyof typeof scoreChanges;

export interface ScoreChange {
  /** Last less first; negative is better. */
  readonly change: number;
  readonly direction: 'better' | 'worse' | 'same';
  /** Whether patients would notice it. */
  readonly important: boolean;
  /** Whether it is more than the questionnaire's own scatter. */
  readonly reliable: boolean;
}

/** Change between two complete totals of the same questionnaire. A lower score is better in both. */
export function judgeScoreChange(
  questionnaire: ChangeQuestionnaire,
  first: number,
  last: number,
): ScoreChange {
  const { important, reliable } = scoreChanges[questionnaire];
  const change = last - first;
  const size = Math.abs(change);
  return {
    change,
    direction: change === 0 ? 'same' : change < 0 ? 'better' : 'worse',
    important: size >= important,
    reliable: size >= reliable,
  };
}
