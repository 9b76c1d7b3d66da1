interface Effort {
  readonly lower: number;
  readonly upper: number;
}

/** How work at the upper end of an effort on the Borg 6–20 scale feels, in plain words; our own wording of its anchors. */
export function effortWords({ upper }: Effort): string {
  if (upper <= 11) return 'light. You can talk with ease.';
  if (upper <= 13) return 'like work, but you can still talk.';
  if (upper <= 15) return 'somewhat hard. You can say a short sentence.';
  return 'hard. You can say a few words at a time.';
}
