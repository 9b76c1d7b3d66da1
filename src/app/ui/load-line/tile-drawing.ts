import { type LoadLineFacts, type RateScale, scaleFor } from './load-line-facts';

/** Where everything of a lying load line stands, in per cent of its width. */
export interface TileDrawing {
  readonly band: {
    readonly kind: 'target' | 'guide';
    readonly x: number;
    readonly width: number;
  } | null;
  readonly ceiling: number | null;
  readonly ask: number | null;
  readonly resting: number | null;
  readonly marker: number | null;
}

// One scale for nearly everyone, so that tiles can be compared at a glance.
const leastScale: RateScale = { min: 50, max: 160 };

export function drawTile(facts: LoadLineFacts): TileDrawing {
  const scale = scaleFor(facts, leastScale);
  const x = (rate: number): number => ((rate - scale.min) / (scale.max - scale.min)) * 100;
  const at = (rate: number | null | undefined): number | null =>
    rate === null || rate === undefined ? null : x(rate);
  const range = facts.target ?? facts.guide;
  return {
    band: range && {
      kind: facts.target ? 'target' : 'guide',
      x: x(range.lower),
      width: x(range.upper) - x(range.lower),
    },
    ceiling: at(facts.ceiling?.value),
    ask: at(facts.askLine),
    resting: at(facts.resting),
    marker: at(facts.marker?.value),
  };
}
