import * as fc from 'fast-check';
import type { LoadLineFacts, RateRange } from './load-line-facts';
import { type PlacedLabel, drawUpright, uprightSizes, wrap } from './upright-drawing';

const rate = fc.integer({ min: 40, max: 200 });
const range: fc.Arbitrary<RateRange> = fc
  .tuple(rate, fc.integer({ min: 5, max: 50 }))
  .map(([lower, width]) => ({ lower, upper: lower + width }));
const words = fc.lorem({ maxCount: 12 });
const facts: fc.Arbitrary<LoadLineFacts> = fc.record({
  resting: fc.option(rate),
  target: fc.option(range),
  guide: fc.option(range),
  ceiling: fc.option(fc.record({ value: rate, reason: words })),
  askLine: fc.option(rate),
  ticks: fc.array(fc.record({ value: rate, label: fc.lorem({ maxCount: 2 }) }), { maxLength: 5 }),
  marker: fc.option(fc.record({ value: rate, label: fc.constant('last peak') })),
});

function overlaps(labels: readonly PlacedLabel[]): boolean {
  const ordered = [...labels].sort((a, b) => a.top - b.top);
  return ordered.some((label, index) => label.bottom > (ordered[index + 1]?.top ?? Infinity));
}

const worked: LoadLineFacts = {
  resting: 62,
  target: { lower: 91, upper: 108 },
  guide: null,
  ceiling: { value: 108, reason: '10 below ischemia at 118' },
  askLine: null,
  ticks: [{ value: 119, label: '80 %' }],
  marker: { value: 96, label: 'last peak' },
};

describe('drawUpright', () => {
  it.each(['worksheet', 'patient'] as const)('keeps the labels of the %s apart', (size) => {
    fc.assert(
      fc.property(facts, (drawn) => {
        const drawing = drawUpright(drawn, uprightSizes[size]);
        expect(overlaps(drawing.labels)).toBe(false);
        expect(overlaps(drawing.ticks)).toBe(false);
      }),
    );
  });

  it('keeps every rate between the ends of the scale', () => {
    fc.assert(
      fc.property(facts, (drawn) => {
        const { top, bottom, ceiling, ask, resting, marker, band } = drawUpright(
          drawn,
          uprightSizes.worksheet,
        );
        const heights = [ceiling, ask, resting, marker, band?.y, band && band.y + band.height];
        for (const y of heights.filter((height) => height !== null && height !== undefined)) {
          expect(y).toBeGreaterThan(top);
          expect(y).toBeLessThan(bottom);
        }
      }),
    );
  });

  it('draws the target up to the ceiling and numbers its ends', () => {
    const drawing = drawUpright(worked, uprightSizes.worksheet);
    expect(drawing.band?.kind).toBe('target');
    expect(drawing.band?.y).toBeCloseTo(drawing.ceiling ?? NaN);
    expect(drawing.band?.numbers.map((number) => number.text)).toEqual(['108', '91']);
  });

  it('names a band beside the bar when it is too low for numbers', () => {
    const low = { ...worked, target: { lower: 103, upper: 108 } };
    const drawing = drawUpright(low, uprightSizes.patient);
    expect(drawing.band?.numbers).toEqual([]);
    const label = drawing.labels.find(({ kind }) => kind === 'range');
    expect(label?.lines[0]?.text).toBe('Target 103–108');
  });

  it('says to go by effort where there is no target, and shows a guide as such', () => {
    const led = { ...worked, target: null, guide: { lower: 82, upper: 92 } };
    const drawing = drawUpright(led, uprightSizes.worksheet);
    expect(drawing.band?.kind).toBe('guide');
    const heads = drawing.labels.map(({ lines }) => lines[0]?.text);
    expect(heads).toContain('Guide 82–92');
    expect(heads).toContain('Go by effort');
  });

  it('calls the ceiling “stay under” for the patient', () => {
    const head = (size: 'worksheet' | 'patient') =>
      drawUpright(worked, uprightSizes[size]).labels[0]?.lines[0]?.text;
    expect(head('worksheet')).toBe('Ceiling 108');
    expect(head('patient')).toBe('Stay under 108');
  });
});

describe('wrap', () => {
  it('breaks at spaces and keeps a long word whole', () => {
    expect(wrap('10 below the lowest detection rate', 14)).toEqual([
      '10 below the',
      'lowest',
      'detection rate',
    ]);
    expect(wrap('electrophysiologist says', 8)).toEqual(['electrophysiologist', 'says']);
    expect(wrap('', 8)).toEqual([]);
  });
});
