import * as z from 'zod';
import './zod';

const policyItemSchema = z.object({
  /** Its place in the policy: `intensity.wide.lower`. */
  key: z.string(),
  subject: z.string(),
  label: z.string(),
  /** '' where the value is a plain fraction or a count. */
  unit: z.string(),
  value: z.number(),
  default: z.number(),
  /** The bounds within which a program may set it, ends included. */
  lowest: z.number(),
  highest: z.number(),
  /** What it is set in multiples of. */
  step: z.number(),
  /** Where the default comes from. */
  source: z.string(),
  /** The version from which on it has had this value, and when that came into force. */
  sinceVersion: z.int(),
  since: z.iso.datetime({ offset: true }),
});

/** `GET /api/policy`: the program's prescribing policy as it is in force. */
export const policyInForceSchema = z.object({
  version: z.int(),
  effectiveFrom: z.iso.datetime({ offset: true }),
  /** Who published it; null for the published defaults. */
  by: z.string().nullable(),
  note: z.string(),
  /** Whether the reader may publish the next version. */
  mayChange: z.boolean(),
  items: z.array(policyItemSchema),
});
export type PolicyInForce = z.infer<typeof policyInForceSchema>;
export type PolicyItem = z.infer<typeof policyItemSchema>;
