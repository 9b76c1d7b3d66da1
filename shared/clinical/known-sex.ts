import type { SexAtBirth } from './prescribing/request';

/** What equations that differ by sex take: where it is not known they give nothing rather than a guess. */
export type KnownSex = Exclude<SexAtBirth, 'unknown'>;
