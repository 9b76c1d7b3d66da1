import { describe, expect, it } from 'vitest';
import { computationOf, ranges } from './computed';
import { rules as prescribingRules } from './rules';
import { misprints, statedRules } from './stated';
import { printedCount, printedRange, vectors } from './vectors';
import type { Vector } from './vectors';
import { wordOf } from './words';

/** What the product does not compute yet, and how many check values wait for it. */
const left: readonly {
  readonly what: string;
  readonly count: number;
  readonly is: (vector: Vector) => boolean;
}[] = [
  {
    what: 'holding and stopping a session',
    count: 29,
    is: ({ section, id }) => section === 6 && !id.startsWith('WALK-'),
  },
  { what: 'coverage and performance measures', count: 17, is: ({ section }) => section === 7 },
  {
    what: 'survival, control limits, funnels',
    count: 65,
    is: ({ id }) => /^(KM|LR|P|NP|FUN)-/.test(id),
  },
  { what: 'interoperability', count: 18, is: ({ section }) => section === 9 },
];

const rules = { ...prescribingRules, ...statedRules };

const isLeft = (vector: Vector) => left.some(({ is }) => is(vector));
const title = ({ id, method, source }: Vector) => `${id}: ${method} (${source})`;

const numbers = vectors.filter((vector) => computationOf(vector) !== undefined);
const printedRanges = vectors.filter(({ id }) => id in ranges);
const named = vectors.filter((vector) => wordOf(vector) !== undefined);
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

  it.each(named.map((vector) => [title(vector), vector] as const))('%s', (_title, vector) => {
    expect(wordOf(vector)?.(vector)).toBe(vector.expected);
  });

  it.each(stated.map((vector) => [title(vector), vector] as const))('%s', (_title, vector) => {
    expect.hasAssertions();
    rules[vector.id]?.(vector);
  });
});

describe('in print, and not so', () => {
  it.each(misprints)('%s', (_title, check) => {
    expect.hasAssertions();
    check();
  });
});

describe('no check value is passed over', () => {
  it.each(left)('$what waits: $count', ({ count, is }) => {
    expect(vectors.filter(is)).toHaveLength(count);
  });

  it('each is run or left, never both', () => {
    const run = new Set([...numbers, ...printedRanges, ...named, ...stated].map(({ id }) => id));
    expect(vectors).toHaveLength(printedCount);
    expect(new Set(vectors.map(({ id }) => id)).size).toBe(printedCount);
    expect(vectors.filter((vector) => run.has(vector.id) === isLeft(vector))).toEqual([]);
    expect(numbers.length + printedRanges.length + named.length + stated.length).toBe(run.size);
    expect(Object.keys(rules).length).toBe(stated.length);
  });
});
