import * as fc from 'fast-check';
import { spreadLabels } from './spread-labels';

const label = fc.record({
  wanted: fc.double({ min: 0, max: 400, noNaN: true }),
  height: fc.double({ min: 5, max: 40, noNaN: true }),
});

describe('spreadLabels', () => {
  it('leaves labels alone that have room', () => {
    const labels = [
      { wanted: 300, height: 20 },
      { wanted: 100, height: 20 },
    ];
    expect(spreadLabels(labels, 0, 400)).toEqual([300, 100]);
  });

  it('moves two that would overlap apart by the same way', () => {
    const labels = [
      { wanted: 100, height: 20 },
      { wanted: 110, height: 20 },
    ];
    expect(spreadLabels(labels, 0, 400)).toEqual([95, 115]);
  });

  it('keeps labels between the edges', () => {
    expect(spreadLabels([{ wanted: 2, height: 20 }], 0, 400)).toEqual([10]);
    expect(spreadLabels([{ wanted: 399, height: 20 }], 0, 400)).toEqual([390]);
  });

  it('never lets two overlap, keeps their order, and stays inside while there is room', () => {
    fc.assert(
      fc.property(fc.array(label, { maxLength: 9 }), (labels) => {
        const middles = spreadLabels(labels, 0, 400);
        const placed = labels
          .map(({ wanted, height }, index) => ({ wanted, height, middle: middles[index] ?? NaN }))
          .sort((a, b) => a.middle - b.middle);
        placed.forEach((one, index) => {
          const next = placed[index + 1];
          expect(one.middle - one.height / 2).toBeGreaterThan(-1e-6);
          expect(one.middle + one.height / 2).toBeLessThan(400 + 1e-6);
          if (next === undefined) return;
          expect(one.middle + one.height / 2).toBeLessThan(next.middle - next.height / 2 + 1e-6);
          expect(one.wanted).toBeLessThanOrEqual(next.wanted);
        });
      }),
    );
  });
});
