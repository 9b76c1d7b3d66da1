import * as z from 'zod';

/** What a test can make go wrong with the next calls to the API. */
const fault = z.discriminatedUnion('kind', [
  /** Done and kept, answered late. */
  z.strictObject({ kind: z.literal('late'), milliseconds: z.int().min(1).max(120_000) }),
  /** Done and kept, then the connection is cut without an answer. */
  z.strictObject({ kind: z.literal('cut') }),
  /** Not begun: another try with the same key may succeed. */
  z.strictObject({ kind: z.literal('refuse'), status: z.int().min(400).max(599) }),
  /** A failure kept under the idempotency key: each try with that key gets it again. */
  z.strictObject({ kind: z.literal('fail'), status: z.int().min(500).max(599) }),
]);
export type Fault = z.output<typeof fault>;

export const faultRule = z.strictObject({
  fault,
  /** The calls that it meets: all, or those whose path starts so. */
  path: z.string().startsWith('/v1/').default('/v1/'),
  method: z.enum(['GET', 'POST']).optional(),
  times: z.int().min(1).max(1_000_000).default(1),
});
export type FaultRule = z.output<typeof faultRule>;

export interface Faults {
  add(rules: readonly FaultRule[]): void;
  clear(): void;
  /** The fault that meets this call, used up by it. */
  next(method: string, path: string): Fault | undefined;
}

/** The faults in waiting, first come first met. */
export function createFaults(): Faults {
  let rules: { rule: FaultRule; left: number }[] = [];
  return {
    add(added) {
      rules.push(...added.map((rule) => ({ rule, left: rule.times })));
    },
    clear() {
      rules = [];
    },
    next(method, path) {
      const met = rules.find(
        ({ rule }) => path.startsWith(rule.path) && (!rule.method || rule.method === method),
      );
      if (!met) return undefined;
      met.left -= 1;
      if (met.left === 0) rules = rules.filter((entry) => entry !== met);
      return met.rule.fault;
    },
  };
}
