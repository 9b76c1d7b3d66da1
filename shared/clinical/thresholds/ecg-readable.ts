/** What on a resting ECG, or taken, hides or mimics ischemia in exercise. */
export const ecgHindrances = [
  'left-bundle-branch-block',
  'ventricular-pacing',
  'pre-excitation',
  'resting-st-depression',
  'ventricular-hypertrophy-with-repolarization',
  'digoxin',
] as const;
export type EcgHindrance = (typeof ecgHindrances)[number];

export const ecgHindranceWords: Readonly<Record<EcgHindrance, string>> = {
  'left-bundle-branch-block': 'Left bundle-branch block',
  'ventricular-pacing': 'Ventricular pacing',
  'pre-excitation': 'Pre-excitation',
  'resting-st-depression': 'ST depression at rest above 1 mm',
  'ventricular-hypertrophy-with-repolarization':
    'Left ventricular hypertrophy with repolarization changes',
  digoxin: 'Digoxin',
};

export const ecgReadableSource =
  'Exercise ECG not interpretable for ischemia: AHA/ACC exercise-testing guidance; from memory';

export interface EcgFacts {
  /** Of the latest resting ECG; null when none is entered. */
  readonly hindrances: readonly EcgHindrance[] | null;
  /** Of the latest rhythm entered: the ventricle is paced. */
  readonly paced: boolean;
  /** Taken now; null when the list was never verified. */
  readonly digoxin: boolean | null;
}

/**
 * Whether the ECG can show ischemia: `cannot` with what hides it, `unknown` without a resting ECG or a verified list of drugs.
 * @see ecgReadableSource
 */
export function ecgReadable({ hindrances, paced, digoxin }: EcgFacts): {
  readonly state: 'can' | 'cannot' | 'unknown';
  readonly because: readonly EcgHindrance[];
} {
  const because = new Set(hindrances ?? []);
  if (paced) because.add('ventricular-pacing');
  if (digoxin === true) because.add('digoxin');
  if (because.size > 0) return { state: 'cannot', because: [...because] };
  return { state: hindrances === null || digoxin === null ? 'unknown' : 'can', because: [] };
}
