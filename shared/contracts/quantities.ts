import * as z from 'zod';
import './zod';

interface Bounds {
  readonly lowest: number;
  readonly highest: number;
}

/** What to enter, in one sentence, for a missing value, a wrong type and an impossible number alike. */
const expected = (label: string, { lowest, highest }: Bounds, unit: string): string =>
  `${label} must be a number from ${lowest} to ${highest}${unit && ` ${unit}`}.`;

/** A number within bounds, ends included; a unit of `shared/units` is given as type, since a brand costs nothing at run time. */
export function within<Q extends number = number>(
  label: string,
  bounds: Bounds,
  unit = '',
): z.ZodType<Q, number> {
  const message = expected(label, bounds, unit);
  const schema = z.number(message).min(bounds.lowest, message).max(bounds.highest, message);
  return schema as unknown as z.ZodType<Q, number>;
}

/** A number that the program itself has computed. */
export function computed<Q extends number = number>(): z.ZodType<Q, number> {
  return z.number() as unknown as z.ZodType<Q, number>;
}

/** One of a closed list. */
export function oneOf<const Values extends readonly [string, ...string[]]>(
  label: string,
  values: Values,
) {
  return z.enum(values, `${label} must be one of: ${values.join(', ')}.`);
}

export const yesOrNo = (label: string) => z.boolean(`${label} must be true or false.`);

/** An object that refuses keys it does not know. */
export function strict<Shape extends z.ZodRawShape>(label: string, shape: Shape) {
  return z.strictObject(shape, {
    error: (issue) =>
      issue.code === 'invalid_type' ? `${label} must be given as an object.` : undefined,
  });
}

/** A list, refused when it is longer than any record could need. */
export function listOf<Item extends z.ZodType>(label: string, item: Item, longest: number) {
  return z
    .array(item, `${label} must be a list; [] when there is none.`)
    .max(longest, `${label} may hold at most ${longest}.`);
}

/** A lower end below an upper end, both within bounds. */
export function rangeWithin<Q extends number = number>(label: string, bounds: Bounds, unit = '') {
  return strict(label, {
    lower: within<Q>(`${label}, lower end`, bounds, unit),
    upper: within<Q>(`${label}, upper end`, bounds, unit),
  }).refine(({ lower, upper }) => lower < upper, {
    path: ['upper'],
    message: `${label}: the upper end must be above the lower end.`,
  });
}
