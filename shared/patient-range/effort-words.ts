interface Effort {
  readonly lower: number;
  readonly upper: number;
}

/** A step of the effort numbers 6 to 20, in plain words. */
export interface EffortStep extends Effort {
  readonly name: string;
  readonly feel: string;
}

/** What the numbers of effort feel like; the words are our own, for people who were never shown a scale. */
export const effortSteps: readonly EffortStep[] = [
  { lower: 6, upper: 8, name: 'At rest', feel: 'Like sitting, or a slow stroll.' },
  { lower: 9, upper: 10, name: 'Easy', feel: 'You breathe as always. You could sing.' },
  { lower: 11, upper: 12, name: 'Gentle work', feel: 'You breathe deeper. You talk with ease.' },
  { lower: 13, upper: 14, name: 'Steady work', feel: 'You feel warm. You can still talk.' },
  { lower: 15, upper: 17, name: 'Tough', feel: 'You can say only a few words.' },
  { lower: 18, upper: 20, name: 'Too much', feel: 'You can’t talk. Slow down at once.' },
];

/** Whether a step is, in part at least, in the range of effort that someone is told. */
export const isInEffort = (step: Effort, { lower, upper }: Effort): boolean =>
  step.lower <= upper && step.upper >= lower;

/** How work at the upper end of an effort feels, to follow "It should feel". */
export function effortWords({ upper }: Effort): string {
  if (upper <= 10) return 'easy. You breathe as always.';
  if (upper <= 12) return 'like gentle work. You can talk with ease.';
  if (upper <= 14) return 'like steady work, but you can still talk.';
  return 'tough. You can say a few words at a time.';
}
