import * as z from 'zod';

const responseCode = z.int().min(400).max(599);

/** What a test can make go wrong with the next messages. */
const fault = z.discriminatedUnion('kind', [
  /** Refuses the connection with a code in the place of the greeting. */
  z.strictObject({ kind: z.literal('refuse-connection'), code: responseCode.default(421) }),
  /** Refuses the recipient; 550 is "no such mailbox", 450 "try again later". */
  z.strictObject({ kind: z.literal('refuse-recipient'), code: responseCode }),
  /** Takes the message in and then refuses it. */
  z.strictObject({ kind: z.literal('refuse-message'), code: responseCode }),
  /** Cuts the connection in the place of an answer to the recipient: nothing was sent yet. */
  z.strictObject({ kind: z.literal('drop-before-message') }),
  /** Keeps the message, or loses it, and cuts the connection in the place of the answer. */
  z.strictObject({ kind: z.literal('drop-after-message'), keep: z.boolean().default(true) }),
]);
export type SmtpFault = z.output<typeof fault>;
type Kind = SmtpFault['kind'];

export const smtpFaultRule = z.strictObject({
  fault,
  times: z.int().min(1).max(1_000_000).default(1),
});

export interface SmtpFaults {
  add(rules: readonly z.output<typeof smtpFaultRule>[]): void;
  clear(): void;
  /** The first waiting fault of one of these kinds, used up by being met. */
  next<K extends Kind>(...kinds: K[]): Extract<SmtpFault, { kind: K }> | undefined;
}

export function createSmtpFaults(): SmtpFaults {
  let waiting: { fault: SmtpFault; left: number }[] = [];
  return {
    add(rules) {
      waiting.push(...rules.map((rule) => ({ fault: rule.fault, left: rule.times })));
    },
    clear() {
      waiting = [];
    },
    next<K extends Kind>(...kinds: K[]) {
      const met = waiting.find((entry) => (kinds as Kind[]).includes(entry.fault.kind));
      if (!met) return undefined;
      met.left -= 1;
      if (met.left === 0) waiting = waiting.filter((entry) => entry !== met);
      return met.fault as Extract<SmtpFault, { kind: K }>;
    },
  };
}
