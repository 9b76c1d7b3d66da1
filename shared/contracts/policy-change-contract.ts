import * as z from 'zod';
import {
  effectParts,
  isOnStep,
  policyStep,
  programPolicyKeys,
  type PolicyKey,
} from '../clinical/program-policy';
import { leads } from '../clinical/prescribing';
import { withdrawalReasons } from '../clinical/withdrawal';
import { noteField } from './fields';
import { within } from './quantities';

const instant = z.iso.datetime({ offset: true });

/** One number of the policy, within its bounds and on its step. */
export function policyNumberSchema(number: PolicyKey) {
  const step = policyStep(number);
  return within(number.label, number, number.unit).refine(
    (value) => isOnStep(value, step),
    `${number.label} is set in steps of ${step}${number.unit && ` ${number.unit}`}.`,
  );
}

/** Numbers by their key: those that change, and no others. */
const valuesSchema = z
  .strictObject(
    Object.fromEntries(
      programPolicyKeys.map((number) => [number.key, policyNumberSchema(number).optional()]),
    ) as Record<string, z.ZodOptional<z.ZodType<number, number>>>,
  )
  .refine((values) => Object.keys(values).length > 0, 'Change at least one number.');

const basedOn = z.int('Give the version that was read.').min(1, 'Versions begin with 1.');

/** `POST /api/policy/preview`: numbers that would take the place of those of the version in force. */
export const policyPreviewRequestSchema = z.strictObject({
  basedOn,
  values: valuesSchema,
  /** How many of the changed ranges to leave out: those that are shown already. */
  offset: z.int().min(0).max(1_000_000).default(0),
});
export type PolicyPreviewRequest = z.infer<typeof policyPreviewRequestSchema>;

/** `POST /api/policy/versions` */
export const policyPublishRequestSchema = z.strictObject({
  basedOn,
  values: valuesSchema,
  reason: noteField(500).min(10, 'Say in a sentence why: at least 10 characters.'),
});
export type PolicyPublishRequest = z.infer<typeof policyPublishRequestSchema>;

const rates = z.object({ lower: z.number(), upper: z.number() });

const briefSchema = z.object({
  leadBy: z.enum(leads),
  target: rates.nullable(),
  guide: rates.nullable(),
  askLine: z.number().nullable(),
  perceivedExertion: z.object({ lower: z.number(), upper: z.number() }),
  ceiling: z.number().nullable(),
});
export type RangeInBrief = z.infer<typeof briefSchema>;

const changedRangeSchema = z.object({
  prescriptionId: z.uuid(),
  /** Null when the reader does not treat, or not at this site: ranges are read by those who treat. */
  patient: z.object({ id: z.uuid(), displayName: z.string(), recordNumber: z.string() }).nullable(),
  site: z.string(),
  parts: z.array(z.enum(effectParts)),
  /** As it was signed and is in force. */
  before: briefSchema,
  /** As the proposed policy would work it out from the same facts; null when its choice would not apply. */
  after: briefSchema.nullable(),
  why: z.string().nullable(),
  /** The version that it was worked out by. */
  policyVersion: z.int(),
  withdrawn: z.array(z.enum(withdrawalReasons)),
});
export type ChangedRange = z.infer<typeof changedRangeSchema>;

export const policyPreviewSchema = z.object({
  /** Prescriptions in force. */
  active: z.int(),
  /** Of them, those that the proposed policy would work out otherwise than the policy in force. */
  changed: z.int(),
  /** Of these, by what changes; one may count in several. */
  byPart: z.partialRecord(z.enum(effectParts), z.int()),
  /** Prescriptions whose review is due now, and would be. */
  reviewsDue: z.object({ before: z.int(), after: z.int() }),
  /** The heaviest changes first. */
  items: z.array(changedRangeSchema),
});
export type PolicyPreview = z.infer<typeof policyPreviewSchema>;

/** `GET /api/policy/versions`, newest first. */
export const policyVersionsSchema = z.object({
  items: z.array(
    z.object({
      version: z.int(),
      effectiveFrom: instant,
      /** Null for the published defaults. */
      by: z.string().nullable(),
      reason: z.string(),
      /** A number at every key. */
      values: z.record(z.string(), z.number()),
    }),
  ),
});
export type PolicyVersions = z.infer<typeof policyVersionsSchema>;
export type PolicyVersion = PolicyVersions['items'][number];
