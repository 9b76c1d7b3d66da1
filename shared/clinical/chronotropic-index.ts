import type { Bpm } from '../units';

/** Below these the rise of the rate is too small; from memory. */
export const chronotropicCutoffs = { unblocked: 0.8, betaBlocker: 0.62 } as const;

export const chronotropicSource =
  'Chronotropic index; 0.80, or 0.62 on a beta blocker, from memory; only after a test limited by symptoms';

/**
 * Chronotropic index: (peak − resting) / (predicted − resting).
 * @param predicted age-predicted maximum, bpm, above `resting`
 * @throws RangeError when the prediction is not above rest
 */
export function chronotropicIndex(peak: Bpm, resting: Bpm, predicted: Bpm): number {
  if (predicted <= resting) {
    throw new RangeError('chronotropic index: the predicted maximum is not above rest');
  }
  return (peak - resting) / (predicted - resting);
}

/**
 * Whether an index is too low.
 * @param onBetaBlocker null when not known: then an index between the two cut-offs cannot be judged, and is null
 */
export function isIndexLow(index: number, onBetaBlocker: boolean | null): boolean | null {
  const { unblocked, betaBlocker } = chronotropicCutoffs;
  // Quotients such as 72/90 may miss the cut-off by the noise of binary fractions.
  const isBelow = (cutoff: number) => index < cutoff - 1e-9;
  if (onBetaBlocker !== null) return isBelow(onBetaBlocker ? betaBlocker : unblocked);
  if (isBelow(betaBlocker)) return true;
  return isBelow(unblocked) ? null : false;
}
