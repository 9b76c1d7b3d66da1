import type { ReasonCode } from './answer';
import type { Decision } from './decision';
import type { Findings } from './findings';

/** The reasons that are stop cautions too. */
const stops: readonly ReasonCode[] = ['icd-rate-unknown', 'physician-sets', 'no-valid-range'];

/** Whether a caution of severity stop is due. */
export const isStopped = ({ blocks }: Findings, { reasons }: Decision): boolean =>
  stops.some((code) => blocks.includes(code) || reasons.includes(code));
