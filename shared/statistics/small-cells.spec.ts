import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { discloseGroups, SMALLEST_CELL, type Disclosure, type GroupCounts } from './small-cells';

const group = (enrolled: number, completed: number, ongoing = 0): GroupCounts => ({
  enrolled,
  completed,
  ongoing,
});

/** A table as rows of completed, ongoing, left. */
type Table = readonly (readonly number[])[];

const tableOf = (groups: readonly GroupCounts[]): Table =>
  groups.map(({ enrolled, completed, ongoing }) => [
    completed,
    ongoing,
    enrolled - completed - ongoing,
  ]);
const sum = (values: readonly number[]) => values.reduce((all, value) => all + value, 0);
const totalOf = (table: Table) => [0, 1, 2].map((part) => sum(table.map((row) => row[part] ?? 0)));

/** Everything that a reader of the file sees or may reckon of a row: its people, then its parts; null is kept back. */
function seen(row: readonly number[], disclosure: Disclosure, empty: readonly boolean[]) {
  const parts = row.map((count, part) => (disclosure === 'all' || empty[part] ? count : null));
  return [disclosure === 'nothing' ? null : sum(row), ...parts];
}

function publicView(table: Table, rows: readonly Disclosure[], total: Disclosure) {
  const totals = totalOf(table);
  // A column of zeros is told as such where it stands in the file; what has left does not.
  const empty = totals.map((count, part) => count === 0 && part < 2);
  return [
    ...table.map((row, index) => seen(row, rows[index] ?? 'nothing', empty)),
    seen(totals, total, empty),
  ];
}

/** Tables one step away: a person moves between two parts or rows, comes, goes, or two change places. */
function neighbors(table: Table): Table[] {
  const cells = table.flatMap((row, i) => row.map((_, part) => [i, part] as const));
  const change = (steps: readonly (readonly [number, number, number])[]) => {
    const next = table.map((row) => [...row]);
    for (const [i, part, by] of steps) {
      const row = next[i];
      if (row) row[part] = (row[part] ?? 0) + by;
    }
    return next.every((row) => row.every((count) => count >= 0) && sum(row) > 0) ? [next] : [];
  };
  return cells.flatMap(([i, c]) => [
    ...change([[i, c, 1]]),
    ...change([[i, c, -1]]),
    ...cells.flatMap(([j, d]) => [
      ...change([
        [i, c, -1],
        [j, d, 1],
      ]),
      ...(i !== j && c !== d
        ? change([
            [i, c, 1],
            [i, d, -1],
            [j, c, -1],
            [j, d, 1],
          ])
        : []),
    ]),
  ]);
}

const cellsOf = (table: Table) =>
  new Map([
    ...table.flatMap((row, i) => [
      [`${i} people`, sum(row)] as const,
      ...row.map((count, part) => [`${i} ${part}`, count] as const),
    ]),
    ...totalOf(table).map((count, part) => [`total ${part}`, count] as const),
    ['total people', sum(totalOf(table))] as const,
  ]);

/** The cells that every table of the same public view holds alike, as far as a search from step to step finds others. */
function determined(table: Table, cells: readonly string[], view: (table: Table) => unknown) {
  const told = JSON.stringify(view(table));
  const own = cellsOf(table);
  const left = new Set(cells);
  const known = new Set([JSON.stringify(table)]);
  const queue = [table];
  for (let at = 0; at < Math.min(queue.length, 300); at++) {
    for (const next of neighbors(queue[at] ?? [])) {
      if (left.size === 0) return left;
      if (JSON.stringify(view(next)) !== told) continue;
      const key = JSON.stringify(next);
      if (known.has(key)) continue;
      known.add(key);
      queue.push(next);
      for (const [cell, count] of cellsOf(next)) if (own.get(cell) !== count) left.delete(cell);
    }
  }
  return left;
}

const groups = fc.array(
  fc
    .tuple(
      fc.oneof(fc.integer({ min: 0, max: 14 }), fc.integer({ min: 0, max: 60 })),
      fc.oneof(fc.constant(0), fc.integer({ min: 0, max: 30 })),
      fc.oneof(fc.constant(0), fc.integer({ min: 0, max: 30 })),
    )
    .filter((parts) => sum(parts) > 0)
    .map((parts) => group(sum(parts), parts[0], parts[1])),
  { minLength: 1, maxLength: 5 },
);

describe('counts that leave the program', () => {
  it('are all told when each is large', () => {
    expect(discloseGroups([group(40, 25), group(30, 15)])).toEqual({
      rows: ['all', 'all'],
      total: 'all',
    });
  });

  it('hide a second row beside the one that is small, so that the total does not tell it', () => {
    const { rows, total } = discloseGroups([
      group(60, 40),
      group(8, 4),
      group(40, 25),
      group(90, 60),
    ]);
    expect([rows, total]).toEqual([['all', 'nothing', 'nothing', 'all'], 'all']);
  });

  it('tell the people of a row whose parts are small', () => {
    const { rows, total } = discloseGroups([group(40, 35), group(30, 12), group(90, 50)]);
    expect([rows, total]).toEqual([['enrolled', 'enrolled', 'all'], 'all']);
  });

  it('hide the total where no other row is left to hide', () => {
    expect(discloseGroups([group(9, 4)])).toEqual({ rows: ['nothing'], total: 'nothing' });
    expect(discloseGroups([group(30, 26)])).toEqual({ rows: ['enrolled'], total: 'enrolled' });
  });

  it('do not let rows of one person each be told by their number', () => {
    const { rows, total } = discloseGroups(Array.from({ length: 12 }, () => group(1, 1)));
    expect(new Set(rows)).toEqual(new Set(['nothing']));
    expect(total).toBe('nothing');
  });

  it('hold no small count, told or by subtraction within a row', () => {
    fc.assert(
      fc.property(groups, (given) => {
        const { rows, total } = discloseGroups(given);
        const table = tableOf(given);
        const told = publicView(table, rows, total).flat();
        for (const count of told) {
          if (count !== null) expect(count === 0 || count >= SMALLEST_CELL).toBe(true);
        }
      }),
      { numRuns: 2000 },
    );
  });

  it('leave no cell that was kept back to be computed from what is told', () => {
    fc.assert(
      fc.property(groups, (given) => {
        const { rows, total } = discloseGroups(given);
        const table = tableOf(given);
        const view = (one: Table) => publicView(one, rows, total);
        const hidden = view(table).flatMap((row, i) =>
          row.flatMap((count, column) =>
            count === null
              ? [`${i === table.length ? 'total' : i} ${column === 0 ? 'people' : column - 1}`]
              : [],
          ),
        );
        // What has left is no column: where nobody has, nothing was kept back there.
        const left = totalOf(table)[2] === 0;
        const cells = hidden.filter((cell) => !(left && cell.endsWith(' 2')));
        expect([...determined(table, cells, view)]).toEqual([]);
      }),
      { numRuns: 300 },
    );
  }, 30_000);

  it('hide a sum of what is hidden that is small itself', () => {
    fc.assert(
      fc.property(groups, (given) => {
        const { rows, total } = discloseGroups(given);
        const table = tableOf(given);
        const together = (
          hides: (one: Disclosure) => boolean,
          count: (row: readonly number[]) => number,
        ) => sum(table.filter((_, i) => hides(rows[i] ?? 'nothing')).map(count));
        const isTold = (count: number) => count === 0 || count >= SMALLEST_CELL;
        if (total !== 'nothing')
          expect(isTold(together((one) => one === 'nothing', sum))).toBe(true);
        if (total === 'all') {
          for (const part of [0, 1, 2]) {
            expect(
              isTold(
                together(
                  (one) => one !== 'all',
                  (row) => row[part] ?? 0,
                ),
              ),
            ).toBe(true);
          }
        }
      }),
      { numRuns: 2000 },
    );
  });
});
