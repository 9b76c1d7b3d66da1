import type { PolicyKey } from './prescribing/policy-keys';

/** A number that a program may set, without its key. */
export type PolicyNumber = Omit<PolicyKey, 'key'>;

/** The numbers of one subject by key. */
export type PolicyNumbers = Readonly<Record<string, PolicyNumber>>;

/** What a program has set: a number for each key. */
export type PolicyValues<T extends PolicyNumbers> = Readonly<Record<keyof T, number>>;

/** The published defaults. */
export const defaultsOf = <T extends PolicyNumbers>(numbers: T): PolicyValues<T> =>
  Object.fromEntries(
    Object.entries(numbers).map(([key, number]) => [key, number.default]),
  ) as PolicyValues<T>;

/** The numbers as a list for people to read and set, `subject.key` each. */
export const policyKeysOf = (subject: string, numbers: PolicyNumbers): PolicyKey[] =>
  Object.entries(numbers).map(([key, number]) => ({ key: `${subject}.${key}`, ...number }));

/** The keys whose value is missing, no number, or outside its bounds; [] when a program may set these. */
export const policyFaults = (
  numbers: PolicyNumbers,
  values: Readonly<Record<string, unknown>>,
): string[] =>
  Object.entries(numbers).flatMap(([key, { lowest, highest }]) => {
    const value = values[key];
    const isWithin = typeof value === 'number' && value >= lowest && value <= highest;
    return isWithin ? [] : [key];
  });
