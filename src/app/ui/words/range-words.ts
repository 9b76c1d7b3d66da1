import type { RangeInForce } from '@shared/contracts/patients-contract';

/** A range in a few words: "91–108 bpm", or "By effort 11–13" where effort leads. */
export function rangeWords({ target, perceivedExertion }: RangeInForce): string {
  if (target !== null) return `${target.lower}–${target.upper} bpm`;
  return `By effort ${perceivedExertion.lower}–${perceivedExertion.upper}`;
}

/** The ceiling beside it: "ceiling 108", or that none is known. */
export const ceilingWords = ({ ceiling }: RangeInForce): string =>
  ceiling === null ? 'no ceiling known' : `ceiling ${ceiling}`;
