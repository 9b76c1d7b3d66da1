import * as z from 'zod';
import './zod';

const policyItemSchema = z.object({
  /** Its place in the policy: `intensity.wide.lower`. */
  key: z.string(),
  label: z.string(),
  /** '' where the value is a plain fraction. */
  unit: z.string(),
  value: z.number(),
  default: z.number(),
  /** The bounds within which a program may set it, ends included. */
  lowest: z.number(),
  highest: z.number(),
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
  note: z.string(),
  items: z.array(policyItemSchema),
});
export type PolicyInForce = z.infer<typeof policyInForceSchema>;
export type PolicyItem = z.infer<typeof policyItemSchema>;
