import * as z from 'zod';
import { leads, maximumMethods, methods, reasonCodes, riskLevels } from '../clinical/prescribing';
import { physicianCauses } from '../clinical/plan-limits';
import { withdrawalReasons } from '../clinical/withdrawal';
import { rangeInForceSchema } from './patients-contract';
import {
  cautionSchema,
  ceilingSchema,
  exertionSchema,
  limitSchema,
  pressureSchema,
  rangeOf,
  ratesSchema,
} from './prescription-answer';
import { rangeCourseSchema, rangePatientSchema } from './prescriptions-worksheet-contract';
import { computed } from './quantities';
import { progressionActions } from '../clinical/progression/propose-progression';
import { rangeFlagSchema } from './range-flag';

// What waits for somebody: ranges for a physician's signature, and what a physiologist has to see to.

const instant = z.iso.datetime({ offset: true });
const signatory = z.object({ id: z.uuid(), displayName: z.string() });

/** A range as it is read at a glance before signing. */
export const awaitingItemSchema = z.object({
  id: z.uuid(),
  version: z.int(),
  patient: rangePatientSchema,
  course: rangeCourseSchema,
  risk: z.enum(riskLevels),
  restingSeated: z.number(),
  result: z.object({
    leadBy: z.enum(leads),
    method: z.enum(methods),
    maximum: z
      .object({
        method: z.enum(maximumMethods),
        value: computed(),
        standardError: computed().nullable(),
      })
      .nullable(),
    target: ratesSchema,
    guide: ratesSchema,
    ceiling: ceilingSchema,
    askLine: computed().nullable(),
    limits: z.array(limitSchema),
    intensity: rangeOf(),
    perceivedExertion: exertionSchema,
    pressureCeiling: pressureSchema,
    oxygenFloor: z.number().nullable(),
    reasons: z.array(z.enum(reasonCodes)),
    cautions: z.array(cautionSchema),
  }),
  /** Why a physician signs it. */
  causes: z.array(z.enum(physicianCauses)),
  /** What was entered since it was worked out that makes it out of date. */
  outdated: z.array(z.enum(withdrawalReasons)),
  signedAt: instant,
  signedBy: signatory,
  /** What it takes the place of; null for a first range. */
  inForce: rangeInForceSchema.nullable(),
});
export type AwaitingItem = z.infer<typeof awaitingItemSchema>;

/** `GET /api/prescriptions/awaiting-signature`: the longest waiting first. */
export const awaitingListSchema = z.object({
  items: z.array(awaitingItemSchema),
  /** How many wait altogether. */
  total: z.int(),
});

/** What waits for somebody, the most urgent first. */
export const taskKinds = [
  'withdrawn',
  'ran-above',
  'without-range',
  'record-unsigned',
  'unsigned',
  'awaiting-physician',
  'next-step',
  'ran-below',
  'review-due',
] as const;
export type TaskKind = (typeof taskKinds)[number];

const taskSchema = z.object({
  patient: rangePatientSchema,
  /** Null for a patient without a range. */
  prescriptionId: z.uuid().nullable(),
  /** Since when: written, signed, or in force; null for a patient without a range. */
  since: instant.nullable(),
  by: z.string().nullable(),
  /** Of a next step: what is proposed. */
  step: z.enum(progressionActions).nullable(),
  /** What touches the range in force, the oldest first. */
  flags: z.array(rangeFlagSchema),
});
export type PrescribingTask = z.infer<typeof taskSchema>;

/** `GET /api/prescriptions/tasks`: what to see to, by kind, each kind with its total and at most 100 of it. */
export const tasksSchema = z.object({
  groups: z.array(
    z.object({ kind: z.enum(taskKinds), total: z.int(), items: z.array(taskSchema) }),
  ),
});
export type PrescribingTasks = z.infer<typeof tasksSchema>;
