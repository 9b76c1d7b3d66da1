export const speechComforts = ['comfortable', 'doubtful', 'not-comfortable'] as const;
/** How speaking went at the end of a stage. */
export type SpeechComfort = (typeof speechComforts)[number];

export const talkTestSource =
  'Talk test, Lyon and Foster 2014: train one or two stages below the last with comfortable speech; at that stage itself 19 of 30 finished the session, below it 28 and 30';

/** The stages to train at, counted from 0; null where the test does not tell. */
export interface TalkTestRange {
  readonly lower: number;
  readonly upper: number;
}

/**
 * The stages one and two below the last at which speech was comfortable. Null when it never was, when it always was (the test was
 * stopped too early to tell), or when nothing lies below.
 * @param stages speech at the end of each stage, in order; null is not asked
 * @see talkTestSource
 */
export function talkTestRange(stages: readonly (SpeechComfort | null)[]): TalkTestRange | null {
  const firstDoubt = stages.findIndex((speech) => speech !== 'comfortable');
  if (firstDoubt < 2 || stages[firstDoubt] === null) return null;
  const last = firstDoubt - 1;
  return { lower: Math.max(0, last - 2), upper: last - 1 };
}
