import { describe, expect, it } from 'vitest';
import { computationOf, ranges } from './computed';
import { rules } from './rules';
import { printedCount, printedRange, vectors } from './vectors';
import type { Vector } from './vectors';

/** What the product does not compute yet, and how many check values wait for it. */
const left: readonly {
  readonly what: string;
  readonly count: number;
  readonly is: (vector: Vector) => boolean;
}[] = [
  {
    what: 'intensity bands by name',
    count: 23,
    is: ({ id }) => /^BAND-(HRR|HRM|RPE|ESC)-/.test(id),
  },
  {
    what: 'maxima that the rules do not offer',
    count: 7,
    is: ({ id }) => /^HRM-(GL2|TLAB|SYF|MECKI|ISC|INB|INBBB)-/.test(id),
  },
  {
    what: 'means of trials, nothing to compute',
    count: 2,
    is: ({ id }) => id.startsWith('RX-JOO-'),
  },
  { what: 'running', count: 7, is: ({ id }) => /^(MET-(WWU1[123]|R1|R2)|BRU-[57])$/.test(id) },
  {
    what: 'walking by mph rounded inside the equation',
    count: 6,
    is: ({ id }) => /^MET-WWU([1-46]|10)$/.test(id),
  },
  {
    what: 'energy, absolute uptake and other constants',
    count: 8,
    is: ({ id }) => /^MET-(W2K|WWU2K|WWU8|R2N|C2A|C5|K2|F96b)$/.test(id),
  },
  {
    what: 'uptake from treadmill time, predicted capacity, heart-rate index',
    count: 19,
    is: ({ id }) => /^(FOS|POL|BR73|FRI|FR18|PCT|KOK|WICKS)/.test(id),
  },
  {
    what: 'predicted walk and its change',
    count: 8,
    is: ({ id }) => /^(6MW-(M|F|MCID)|ROSS)/.test(id),
  },
  { what: 'risk, monitoring, staffing', count: 10, is: ({ section }) => section === 5 },
  { what: 'holding and stopping a session', count: 31, is: ({ section }) => section === 6 },
  { what: 'coverage and performance measures', count: 17, is: ({ section }) => section === 7 },
  {
    what: 'outcomes, questionnaires, training load, other statistics',
    count: 107,
    is: ({ section, id }) => section === 8 && !id.startsWith('WIL-'),
  },
  { what: 'interoperability', count: 18, is: ({ section }) => section === 9 },
];

const isLeft = (vector: Vector) => left.some(({ is }) => is(vector));
const title = ({ id, method, source }: Vector) => `${id}: ${method} (${source})`;

const numbers = vectors.filter((vector) => computationOf(vector) !== undefined);
const printedRanges = vectors.filter(({ id }) => id in ranges);
const stated = vectors.filter(({ id }) => id in rules);

describe('published and recomputed check values', () => {
  it.each(numbers.map((vector) => [title(vector), vector] as const))('%s', (_title, vector) => {
    const computed = computationOf(vector)?.(vector) ?? NaN;
    expect(Math.abs(computed - Number(vector.expected))).toBeLessThanOrEqual(vector.tolerance ?? 0);
  });

  it.each(printedRanges.map((vector) => [title(vector), vector] as const))(
    '%s',
    (_title, vector) => {
      const ends = ranges[vector.id]?.(vector) ?? [];
      // Printed with one decimal at most.
      expect(ends.map((end) => Math.round(end * 10) / 10)).toEqual(printedRange(vector));
    },
  );

  it.each(stated.map((vector) => [title(vector), vector] as const))('%s', (_title, vector) => {
    expect.hasAssertions();
    rules[vector.id]?.(vector);
  });
});

describe('no check value is passed over', () => {
  it.each(left)('$what waits: $count', ({ count, is }) => {
    expect(vectors.filter(is)).toHaveLength(count);
  });

  it('each is run or left, never both', () => {
    const run = new Set([...numbers, ...printedRanges, ...stated].map(({ id }) => id));
    expect(vectors).toHaveLength(printedCount);
    expect(new Set(vectors.map(({ id }) => id)).size).toBe(printedCount);
    expect(vectors.filter((vector) => run.has(vector.id) === isLeft(vector))).toEqual([]);
    expect(numbers.length + printedRanges.length + stated.length).toBe(run.size);
    expect(Object.keys(rules).length).toBe(stated.length);
  });
});
