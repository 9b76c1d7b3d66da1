/** Beats a minute, both ends inclusive. */
export interface RateRange {
  readonly lower: number;
  readonly upper: number;
}

/** What a load line draws; every rate in beats a minute. */
export interface LoadLineFacts {
  readonly resting: number | null;
  /** The range to work in; null when effort leads. */
  readonly target: RateRange | null;
  /** A range that only guides while effort leads. */
  readonly guide: RateRange | null;
  /** Never to be passed, with the reason in words. */
  readonly ceiling: { readonly value: number; readonly reason: string } | null;
  /** Where the floor asks, when no ceiling is known. */
  readonly askLine: number | null;
  /** Where other methods would have put the upper end. */
  readonly ticks: readonly { readonly value: number; readonly label: string }[];
  /** A rate that was measured, such as the last peak. */
  readonly marker: { readonly value: number; readonly label: string } | null;
}

export type LoadLineSize = 'worksheet' | 'patient' | 'tile';

/** The lower and upper end of a drawn scale, multiples of 10. */
export interface RateScale {
  readonly min: number;
  readonly max: number;
}

/** The scale that holds every rate of the facts with room around, and `least` in any case. */
export function scaleFor(facts: LoadLineFacts, least: RateScale): RateScale {
  const rates = [
    facts.resting,
    facts.target?.lower,
    facts.target?.upper,
    facts.guide?.lower,
    facts.guide?.upper,
    facts.ceiling?.value,
    facts.askLine,
    facts.marker?.value,
    ...facts.ticks.map((tick) => tick.value),
  ].filter((rate) => rate !== null && rate !== undefined);
  return {
    min: Math.floor((Math.min(least.min + 5, ...rates) - 5) / 10) * 10,
    max: Math.ceil((Math.max(least.max - 15, ...rates) + 15) / 10) * 10,
  };
}

/** One scale for several load lines beside each other. */
export function commonScale(lines: readonly LoadLineFacts[], least: RateScale): RateScale {
  const scales = lines.map((facts) => scaleFor(facts, least));
  return {
    min: Math.min(least.min, ...scales.map(({ min }) => min)),
    max: Math.max(least.max, ...scales.map(({ max }) => max)),
  };
}
