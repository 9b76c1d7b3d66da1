/** A fact of two versions beside each other, in words. */
export interface Difference {
  readonly label: string;
  /** Null: there was none. */
  readonly before: string | null;
  readonly after: string | null;
  /** What changed, in words; null where nothing did. */
  readonly change: string | null;
}

/** Facts that belong together. */
export interface DifferenceGroup {
  readonly heading: string;
  readonly rows: readonly Difference[];
}

const aNumber = /^-?\d+(?:\.\d+)?/;
const unitOf = (text: string): string => text.replace(aNumber, '');

/** "6 higher" where both are a number of the same unit. */
function stepOf(before: string, after: string): string | null {
  const [from, to] = [aNumber.exec(before)?.[0], aNumber.exec(after)?.[0]];
  if (from === undefined || to === undefined || unitOf(before) !== unitOf(after)) return null;
  if (/\d/.test(unitOf(before))) return null;
  const step = Number((Number(to) - Number(from)).toFixed(2));
  return step > 0 ? `${step} higher` : `${-step} lower`;
}

/** What became of a fact, in words; null where it is as it was. */
export function changeOf(before: string | null, after: string | null): string | null {
  if (before === after) return null;
  if (before === null) return 'new';
  if (after === null) return 'gone';
  return stepOf(before, after) ?? 'changed';
}

export const difference = (
  label: string,
  before: string | null,
  after: string | null,
): Difference => ({ label, before, after, change: changeOf(before, after) });

/**
 * Pairs what two lists hold of the same kind, in the order of the first; a second one of a kind pairs with the second.
 * @param keyOf says which are of a kind
 */
export function paired<T>(
  before: readonly T[],
  after: readonly T[],
  keyOf: (item: T) => string,
): { readonly before: T | null; readonly after: T | null }[] {
  const left = [...after];
  const pairs = before.map((one) => {
    const at = left.findIndex((other) => keyOf(other) === keyOf(one));
    const [found = null] = at < 0 ? [] : left.splice(at, 1);
    return { before: one, after: found };
  });
  return [...pairs, ...left.map((one) => ({ before: null, after: one }))];
}
