import type { Bpm } from '../../units';
import { bpm } from '../../units';

export const recoveryPostures = ['upright', 'seated', 'supine'] as const;
/** How the patient recovered; the cut-off depends on it. */
export type RecoveryPosture = (typeof recoveryPostures)[number];

export const testEfforts = ['maximal', 'submaximal'] as const;
/** Whether the test was limited by symptoms or stopped before. */
export type TestEffort = (typeof testEfforts)[number];

export interface RecoveryCriterion {
  readonly key: string;
  readonly minute: 1 | 2;
  readonly effort: TestEffort;
  /** Null: the authors' posture is not asked. */
  readonly posture: RecoveryPosture | null;
  /** A fall of this or less is abnormal, bpm. */
  readonly abnormalTo: Bpm;
  readonly source: string;
}

export const recoveryCriteria = {
  'upright-one-minute': {
    key: 'upright-one-minute',
    minute: 1,
    effort: 'maximal',
    posture: 'upright',
    abnormalTo: bpm(12),
    source: 'Cole 1999, walking cool-down; Sydó: below 13',
  },
  'supine-one-minute': {
    key: 'supine-one-minute',
    minute: 1,
    effort: 'maximal',
    posture: 'supine',
    abnormalTo: bpm(18),
    source: 'Supine at once, as in echocardiographic protocols',
  },
  'submaximal-two-minutes': {
    key: 'submaximal-two-minutes',
    minute: 2,
    effort: 'submaximal',
    posture: null,
    abnormalTo: bpm(42),
    source: 'Cole 2000, submaximal test',
  },
  'maximal-two-minutes': {
    key: 'maximal-two-minutes',
    minute: 2,
    effort: 'maximal',
    posture: null,
    abnormalTo: bpm(22),
    source: 'Shetler 2001: hazard 2.6 with a fall of 22 or less',
  },
} as const satisfies Readonly<Record<string, RecoveryCriterion>>;

/** The fall from peak, bpm; negative when the rate went on rising. */
export const heartRateRecovery = (peak: Bpm, later: Bpm): Bpm => bpm(peak - later);

export const isRecoveryAbnormal = (fall: Bpm, { abnormalTo }: RecoveryCriterion): boolean =>
  fall <= abnormalTo;

export interface RecoveryFacts {
  readonly minute: 1 | 2;
  /** Null: not recorded. */
  readonly posture: RecoveryPosture | null;
  /** Null: not recorded. */
  readonly effort: TestEffort | null;
}

/** The cut-off for how the patient recovered; null where none was published or the facts do not tell. */
export function recoveryCriterionFor({
  minute,
  posture,
  effort,
}: RecoveryFacts): RecoveryCriterion | null {
  const criteria: readonly RecoveryCriterion[] = Object.values(recoveryCriteria);
  const found = criteria.find(
    (criterion) =>
      criterion.minute === minute &&
      criterion.effort === effort &&
      (criterion.posture === null || criterion.posture === posture),
  );
  return found ?? null;
}
