import { type LoadLineFacts, type RateRange, type RateScale, scaleFor } from './load-line-facts';
import { spreadLabels } from './spread-labels';

/** Sizes of an upright load line, in the units of its viewBox, which are CSS pixels where there is room. */
export interface UprightSize {
  readonly width: number;
  readonly height: number;
  readonly barX: number;
  readonly barWidth: number;
  /** Text of headings, and of all else. */
  readonly large: number;
  readonly small: number;
  readonly ceilingWord: string;
}

export const uprightSizes = {
  worksheet: {
    width: 420,
    height: 440,
    barX: 168,
    barWidth: 56,
    large: 16,
    small: 14,
    ceilingWord: 'Ceiling',
  },
  patient: {
    width: 340,
    height: 420,
    barX: 58,
    barWidth: 72,
    large: 20,
    small: 18,
    ceilingWord: 'Stay under',
  },
} as const satisfies Record<string, UprightSize>;

export type LabelKind = 'ceiling' | 'ask' | 'range' | 'effort' | 'marker' | 'resting' | 'tick';

export interface PlacedLabel {
  readonly kind: LabelKind;
  readonly lines: readonly { readonly text: string; readonly large: boolean; readonly y: number }[];
  /** Where it belongs on the scale, and where its middle stands. */
  readonly anchor: number;
  readonly middle: number;
  readonly top: number;
  readonly bottom: number;
}

export interface UprightDrawing {
  readonly size: UprightSize;
  /** Where the picture begins: the room for ticks is left out where there are none. */
  readonly left: number;
  readonly top: number;
  readonly bottom: number;
  readonly graduations: readonly { readonly y: number; readonly value: number | null }[];
  readonly band: {
    readonly kind: 'target' | 'guide';
    readonly y: number;
    readonly height: number;
    /** The ends as numbers inside the band; [] where it is too low for them. */
    readonly numbers: readonly { readonly text: string; readonly y: number }[];
  } | null;
  readonly ceiling: number | null;
  readonly ask: number | null;
  readonly resting: number | null;
  readonly marker: number | null;
  /** Right of the bar. */
  readonly labels: readonly PlacedLabel[];
  /** Left of the scale. */
  readonly ticks: readonly PlacedLabel[];
}

interface Wanted {
  readonly kind: LabelKind;
  readonly anchor: number;
  readonly lines: readonly { readonly text: string; readonly large: boolean }[];
}

/** What a scale shows at the least. */
export const leastScale: RateScale = { min: 50, max: 140 };
const leading = 1.25;
const gap = 4;
/** Room left of the bar for the scale, and how far left of it the names of ticks end. */
const scaleRoom = 58;
const tickEnd = 76;

/** Breaks a text into lines of at most so many characters, at spaces; a longer word stays whole. */
export function wrap(text: string, characters: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(/\s+/).filter((part) => part !== '')) {
    const last = lines.at(-1);
    if (last !== undefined && last.length + 1 + word.length <= characters) {
      lines[lines.length - 1] = `${last} ${word}`;
    } else {
      lines.push(word);
    }
  }
  return lines;
}

function place(wanted: readonly Wanted[], size: UprightSize): PlacedLabel[] {
  const heightOf = (large: boolean): number => (large ? size.large : size.small) * leading;
  const sized = wanted.map((label) => ({
    ...label,
    height: label.lines.reduce((sum, line) => sum + heightOf(line.large), 0),
  }));
  const middles = spreadLabels(
    sized.map(({ anchor, height }) => ({ wanted: anchor, height: height + gap })),
    0,
    size.height,
  );
  return sized.map(({ kind, anchor, lines, height }, index) => {
    const middle = middles[index] ?? anchor;
    const top = middle - height / 2;
    let bottom = top;
    const placed = lines.map(({ text, large }) => {
      bottom += heightOf(large);
      // The baseline stands a quarter of the line's height above its foot.
      return { text, large, y: bottom - heightOf(large) * 0.26 };
    });
    return { kind, anchor, middle, top, bottom, lines: placed };
  });
}

function bandOf(
  { target, guide }: LoadLineFacts,
  size: UprightSize,
  y: (rate: number) => number,
): UprightDrawing['band'] {
  const range = target ?? guide;
  if (range === null) return null;
  const top = y(range.upper);
  const height = y(range.lower) - top;
  return {
    kind: target ? 'target' : 'guide',
    y: top,
    height,
    numbers: target === null ? [] : numbersIn(target, top, height, size.large),
  };
}

function numbersIn({ lower, upper }: RateRange, top: number, height: number, text: number) {
  if (height < 2.5 * text) return [];
  return [
    { text: String(upper), y: top + text * 1.2 },
    { text: String(lower), y: top + height - text * 0.5 },
  ];
}

function rightLabels(
  facts: LoadLineFacts,
  size: UprightSize,
  y: (rate: number) => number,
  bandIsNumbered: boolean,
  middleOfScale: number,
): Wanted[] {
  // Lato's average character is about half as wide as the text is high.
  const characters = Math.floor((size.width - labelX(size)) / (size.small * 0.5));
  const wanted: Wanted[] = [];
  const add = (kind: LabelKind, anchor: number, head: string, rest = ''): void => {
    const lines = wrap(rest, characters).map((text) => ({ text, large: false }));
    wanted.push({ kind, anchor, lines: [{ text: head, large: true }, ...lines] });
  };
  const range = facts.target ?? facts.guide;
  if (facts.ceiling) {
    const { value, reason } = facts.ceiling;
    add('ceiling', y(value), `${size.ceilingWord} ${value}`, reason);
  }
  if (facts.askLine !== null) add('ask', y(facts.askLine), `Ask at ${facts.askLine}`);
  if (range && !bandIsNumbered) {
    const middle = (y(range.lower) + y(range.upper)) / 2;
    add('range', middle, `${facts.target ? 'Target' : 'Guide'} ${range.lower}–${range.upper}`);
  }
  if (facts.target === null) {
    const anchor = facts.guide ? y(facts.guide.lower) : middleOfScale;
    add('effort', anchor, 'Go by effort', facts.guide ? '' : 'No heart-rate target');
  }
  if (facts.marker) {
    add('marker', y(facts.marker.value), `${facts.marker.value} ${facts.marker.label}`);
  }
  if (facts.resting !== null) {
    const lines = [{ text: `Resting ${facts.resting}`, large: false }];
    wanted.push({ kind: 'resting', anchor: y(facts.resting), lines });
  }
  return wanted;
}

/** Where the labels right of the bar begin. */
export function labelX(size: UprightSize): number {
  return size.barX + size.barWidth + 26;
}

/**
 * Where everything of an upright load line stands; no label overlaps another.
 * @param least what its scale shows in any case, so that two can stand on one scale
 */
export function drawUpright(
  facts: LoadLineFacts,
  size: UprightSize,
  least: RateScale = leastScale,
): UprightDrawing {
  const scale = scaleFor(facts, least);
  const top = 12;
  const bottom = size.height - 12;
  const y = (rate: number): number =>
    bottom - ((rate - scale.min) / (scale.max - scale.min)) * (bottom - top);
  const at = (rate: number | null | undefined): number | null =>
    rate === null || rate === undefined ? null : y(rate);
  const band = bandOf(facts, size, y);
  const bandIsNumbered = band !== null && band.numbers.length > 0;
  const tickCharacters = Math.floor((size.barX - tickEnd) / (size.small * 0.5));
  const steps = Array.from(
    { length: (scale.max - scale.min) / 10 + 1 },
    (_, step) => scale.min + step * 10,
  );
  return {
    size,
    left: facts.ticks.length > 0 ? 0 : size.barX - scaleRoom,
    top,
    bottom,
    graduations: steps.map((rate) => ({ y: y(rate), value: rate % 20 === 0 ? rate : null })),
    band,
    ceiling: at(facts.ceiling?.value),
    ask: at(facts.askLine),
    resting: at(facts.resting),
    marker: at(facts.marker?.value),
    labels: place(rightLabels(facts, size, y, bandIsNumbered, (top + bottom) / 2), size),
    ticks: place(
      facts.ticks.map(({ value, label }) => ({
        kind: 'tick',
        anchor: y(value),
        lines: wrap(label, tickCharacters).map((text) => ({ text, large: false })),
      })),
      size,
    ),
  };
}
