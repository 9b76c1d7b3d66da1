import { drawRates } from './rate-drawing';

const session = (
  heartRate: number | null,
  target: { lower: number; upper: number } | null = { lower: 91, upper: 105 },
) => ({ localDate: '2026-11-02', heartRate, effort: null, target });

describe('the picture of the rates', () => {
  it('stands on whole steps around all that it shows', () => {
    const { ticks, plot } = drawRates([session(97), session(112)]);
    expect(ticks.map(({ rate }) => rate)).toEqual([80, 100, 120]);
    expect(ticks[0]?.y).toBe(plot.bottom);
    expect(ticks.at(-1)?.y).toBe(plot.top);
  });

  it('keeps the place of a session without a reading, and draws no dot there', () => {
    const { dots, plot } = drawRates([session(100), session(null), session(100)]);
    expect(dots).toHaveLength(2);
    const [first, last] = dots;
    expect((last?.x ?? 0) - (first?.x ?? 0)).toBeCloseTo(((plot.right - plot.left) * 2) / 3, 9);
    expect(first?.y).toBe(last?.y);
  });

  it('joins sessions next to each other that had the same range', () => {
    const other = { lower: 95, upper: 110 };
    const { bands, plot } = drawRates([
      session(97),
      session(98),
      session(99, other),
      session(99, null),
      session(99, other),
    ]);
    const share = (plot.right - plot.left) / 5;
    expect(bands.map(({ width }) => Math.round(width / share))).toEqual([2, 1, 1]);
    expect(bands.map(({ x }) => Math.round((x - plot.left) / share))).toEqual([0, 2, 4]);
  });

  it('draws no range where effort led, and a rate above its range above the band', () => {
    const { dots, bands } = drawRates([session(118), session(98, null)]);
    expect(bands).toHaveLength(1);
    expect(dots[0]?.y).toBeLessThan(bands[0]?.top ?? 0);
  });

  it('stays within its frame for one session and for seventy-two', () => {
    for (const count of [1, 72]) {
      const { dots, radius, plot } = drawRates(Array.from({ length: count }, () => session(100)));
      expect(dots).toHaveLength(count);
      for (const { x } of dots) {
        expect(x - radius).toBeGreaterThanOrEqual(plot.left - 1);
        expect(x + radius).toBeLessThanOrEqual(plot.right + 1);
      }
    }
  });
});
