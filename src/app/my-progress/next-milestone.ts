/** A point of the course worth a word, by sessions done. */
export interface Milestone {
  readonly at: number;
  readonly words: string;
}

/** Quarters of the planned sessions; of two that fall together the later one counts. */
function milestonesOf(planned: number): Milestone[] {
  return [
    { at: Math.ceil(planned / 4), words: 'a quarter of the way' },
    { at: Math.ceil(planned / 2), words: 'half way' },
    { at: Math.ceil((planned * 3) / 4), words: 'three quarters of the way' },
    { at: planned, words: 'all of your planned sessions' },
  ];
}

/** What comes next, null once all planned sessions are done. @param planned 1 or more */
export function nextMilestone(done: number, planned: number): Milestone | null {
  if (done === 0) return { at: 1, words: 'your first session' };
  const ahead = milestonesOf(planned).filter(({ at }) => at > done);
  const [next] = ahead;
  return ahead.filter(({ at }) => at === next?.at).at(-1) ?? null;
}
