/** People of one group, of whom the completed and the ongoing are a part; the rest has left. */
export interface GroupCounts {
  /** Whole, 1 or more. */
  readonly enrolled: number;
  readonly completed: number;
  readonly ongoing: number;
}

/** What may leave the program of a row: every count, the people in it alone, or nothing. */
export type Disclosure = 'all' | 'enrolled' | 'nothing';

export interface Disclosed {
  /** In the order given. */
  readonly rows: readonly Disclosure[];
  readonly total: Disclosure;
}

/**
 * The smallest count of people that is told outside. Cells of 1 to 10 are kept back by those who publish from the data of US
 * Medicare (its cell size suppression policy; from memory), and by many others: common practice.
 */
export const SMALLEST_CELL = 11;

const isSmall = (count: number): boolean => count > 0 && count < SMALLEST_CELL;
const sum = (values: readonly number[]): number => values.reduce((all, value) => all + value, 0);

/** Completed, ongoing and left: the last is in no column, and is told by subtraction all the same. */
const partsOf = ({ enrolled, completed, ongoing }: GroupCounts): [number, number, number] => [
  completed,
  ongoing,
  enrolled - completed - ongoing,
];

/** Adds the next row to what is hidden, the smallest first, until it is safe; null when it never is. */
function grow(
  hidden: ReadonlySet<number>,
  order: readonly number[],
  isSafe: (hidden: ReadonlySet<number>) => boolean,
): ReadonlySet<number> | null {
  const grown = new Set(hidden);
  for (const next of [null, ...order.filter((row) => !hidden.has(row))]) {
    if (next !== null) grown.add(next);
    if (isSafe(grown)) return grown;
  }
  return null;
}

/**
 * Decides which counts of a report may leave the program: none of 1 to 10 people, and none from which such a one could be
 * computed, by subtraction from a total, from the people in a row, or from a rate.
 *
 * What is hidden of a column that has a total belongs to two rows or more, and is 11 people or more together; where no further row
 * is there to hide, the total is hidden. A count whose total is 0 is 0 in every row and hides nothing.
 * @param groups disjoint, all that the total holds
 */
export function discloseGroups(groups: readonly GroupCounts[]): Disclosed {
  const enrolled = groups.map((group) => group.enrolled);
  const parts = groups.map(partsOf);
  const totals = [0, 1, 2].map((part) => sum(parts.map((row) => row[part] ?? 0)));
  const present = [0, 1, 2].filter((part) => (totals[part] ?? 0) > 0);
  const order = [...groups.keys()].sort((a, b) => (enrolled[a] ?? 0) - (enrolled[b] ?? 0));
  const rowsWhere = (test: (row: number) => boolean) => new Set(order.filter(test));
  const hiddenOf = (hidden: ReadonlySet<number>, count: (row: number) => number) =>
    sum([...hidden].map(count));

  const small = rowsWhere((row) => isSmall(enrolled[row] ?? 0));
  const people = grow(small, order, (hidden) => {
    if (hidden.size === 0) return true;
    const together = hiddenOf(hidden, (row) => enrolled[row] ?? 0);
    // Everybody a row of one would be known to be one.
    return hidden.size > 1 && together >= SMALLEST_CELL && together > hidden.size;
  });
  const withoutPeople = people ?? small;
  // Where all people are of one part, that part is the row.
  const base =
    present.length < 2
      ? withoutPeople
      : rowsWhere((row) => withoutPeople.has(row) || (parts[row] ?? []).some(isSmall));
  const split = grow(base, order, (hidden) => {
    if (hidden.size === 0 || present.length < 2) return true;
    const isEnough = (part: number) =>
      hiddenOf(hidden, (row) => parts[row]?.[part] ?? 0) >= SMALLEST_CELL;
    return hidden.size > 1 && present.every(isEnough);
  });
  const isTotalTold = people !== null && split !== null;
  const withoutParts = isTotalTold ? split : base;
  const rowDisclosure = (row: number): Disclosure => {
    if (withoutPeople.has(row)) return 'nothing';
    return withoutParts.has(row) ? 'enrolled' : 'all';
  };
  const total = people === null ? 'nothing' : isTotalTold ? 'all' : 'enrolled';
  return { rows: [...groups.keys()].map(rowDisclosure), total };
}
