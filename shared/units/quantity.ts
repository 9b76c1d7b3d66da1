declare const unitOf: unique symbol;

/** A number that knows its unit; two units do not mix, so a pressure never passes for a rate. */
export type Quantity<Unit extends string> = number & { readonly [unitOf]: Unit };

/** Makes a quantity; throws RangeError when the number is not finite. */
export type QuantityOf<Q extends number> = (value: number) => Q;

/** The constructor of one unit; `name` stands in its error. */
export function quantity<Q extends number>(name: string): QuantityOf<Q> {
  return (value) => {
    if (!Number.isFinite(value)) throw new RangeError(`${name}: a finite number is expected`);
    return value as Q;
  };
}

/** Whether an unknown value is a finite number within the bounds, ends included. */
export function isWithin(value: unknown, lowest: number, highest: number): value is number {
  return typeof value === 'number' && value >= lowest && value <= highest;
}

/** A lower and an upper end, both included; `lower` is below `upper`. */
export interface Range<Q extends number> {
  readonly lower: Q;
  readonly upper: Q;
}
