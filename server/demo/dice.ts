/** Change it and another program is invented; everything else follows from it and from the day. */
const SEED = 'Harbor Lane 1';

/** Numbers that look drawn but follow from a key alone, so that the same key tells the same story at every start. */
export interface Dice {
  /** 0 inclusive to 1 exclusive. */
  next(): number;
  /** A whole number from `low` to `high`, both included. */
  whole(low: number, high: number): number;
  chance(probability: number): boolean;
  /** Bell-shaped around `mean`; never further than three deviations. */
  near(mean: number, deviation: number): number;
  pick<T>(list: readonly T[]): T;
  /** Picks by relative weight. */
  weigh<T>(list: readonly T[], weight: (item: T) => number): T;
}

/** Cyrb128, a quick hash into four words of 32 bits, public domain: it scatters, it keeps no secrets. */
function scatter(key: readonly (string | number)[]): [number, number, number, number] {
  const text = `${SEED}|${key.join('|')}`;
  let [a, b, c, d] = [1_779_033_703, 3_144_134_277, 1_013_904_242, 2_773_480_762];
  for (let at = 0; at < text.length; at++) {
    const code = text.charCodeAt(at);
    a = b ^ Math.imul(a ^ code, 597_399_067);
    b = c ^ Math.imul(b ^ code, 2_869_860_233);
    c = d ^ Math.imul(c ^ code, 951_274_213);
    d = a ^ Math.imul(d ^ code, 2_716_044_179);
  }
  a = Math.imul(c ^ (a >>> 18), 597_399_067);
  b = Math.imul(d ^ (b >>> 22), 2_869_860_233);
  c = Math.imul(a ^ (c >>> 17), 951_274_213);
  d = Math.imul(b ^ (d >>> 19), 2_716_044_179);
  a ^= b ^ c ^ d;
  return [a >>> 0, (b ^ a) >>> 0, (c ^ a) >>> 0, (d ^ a) >>> 0];
}

/** Mulberry32: a small generator of 32 bits of state, public domain. */
function generator(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
}

function only<T>(item: T | undefined): T {
  if (item === undefined) throw new RangeError('nothing to pick from');
  return item;
}

/** @throws RangeError from `pick` and `weigh` when the list is empty */
export function dice(...key: readonly (string | number)[]): Dice {
  const next = generator(scatter(key)[0]);
  return {
    next,
    whole: (low, high) => low + Math.floor(next() * (high - low + 1)),
    chance: (probability) => next() < probability,
    near: (mean, deviation) => mean + deviation * (next() + next() + next() - 1.5) * 2,
    pick: (list) => only(list[Math.floor(next() * list.length)]),
    weigh: (list, weight) => {
      let left = next() * list.reduce((sum, item) => sum + weight(item), 0);
      return only(list.find((item) => (left -= weight(item)) < 0) ?? list.at(-1));
    },
  };
}

const hex = (value: number, digits: number) => value.toString(16).padStart(digits, '0');

/** A UUIDv7 whose time is the row's and whose random part follows from the key. */
export function idAt(at: Date, ...key: readonly (string | number)[]): string {
  const time = hex(at.getTime(), 12);
  const [a, b, c, d] = scatter(key);
  const variant = hex(0x8000 | (b & 0x3fff), 4);
  return `${time.slice(0, 8)}-${time.slice(8)}-7${hex(a & 0xfff, 3)}-${variant}-${hex(c & 0xffff, 4)}${hex(d, 8)}`;
}
