import * as z from 'zod';
import type { MachineSetting } from '../clinical/progression/machine-setting';
import { progressionActions } from '../clinical/progression/propose-progression';
import { progressionReasons, type ProgressionReasonCode } from '../clinical/progression/reasons';
import type { Mets, Minutes } from '../units';
import { numberField, textField, wholeNumberField } from './fields';
import { computed } from './quantities';

const instant = z.iso.datetime({ offset: true });

export const bounds = {
  speedMph: { lowest: 0.5, highest: 12 },
  gradePercent: { lowest: 0, highest: 25 },
  powerWatts: { lowest: 5, highest: 400 },
  stepHeightMeters: { lowest: 0.04, highest: 0.4 },
  stepsPerMinute: { lowest: 5, highest: 60 },
  mets: { lowest: 1, highest: 20 },
  minutes: { lowest: 1, highest: 180 },
} as const;

/** How a machine was set. Walking and running are chosen by the gait that is seen. */
export const machineSettingSchema = z.discriminatedUnion('modality', [
  z.strictObject({
    modality: z.enum(['treadmill-walk', 'treadmill-run']),
    speedMph: numberField(bounds.speedMph, 'mph'),
    gradePercent: numberField(bounds.gradePercent, '%'),
  }),
  z.strictObject({
    modality: z.enum(['cycle', 'arm']),
    powerWatts: numberField(bounds.powerWatts, 'W'),
  }),
  z.strictObject({
    modality: z.literal('step'),
    stepHeightMeters: numberField(bounds.stepHeightMeters, 'm'),
    stepsPerMinute: numberField(bounds.stepsPerMinute, 'step cycles/min'),
  }),
  z.strictObject({ modality: z.literal('stepper'), mets: numberField(bounds.mets, 'METs') }),
]);

/** A brand costs nothing at run time. */
export const settingOf = (setting: z.infer<typeof machineSettingSchema>): MachineSetting =>
  setting as MachineSetting;

/** `PUT /api/exercise-bouts/:id` → 201 first, 200 the same again; the latest of a record counts. */
export const boutRequestSchema = z.strictObject({
  sessionRecordId: z.uuid(),
  setting: machineSettingSchema,
  /** Conditioning without pauses; null when nobody timed it. */
  minutes: wholeNumberField(bounds.minutes, 'min').nullable(),
  /** Bouts too short for heart rate to follow. */
  shortBouts: z.boolean().default(false),
});
export type BoutRequest = z.infer<typeof boutRequestSchema>;

export const boutSchema = boutRequestSchema.extend({
  id: z.uuid(),
  setting: machineSettingSchema,
  shortBouts: z.boolean(),
  receivedAt: instant,
  recordedBy: z.string(),
});
export type Bout = z.infer<typeof boutSchema>;

export const loadSchema = z.object({
  setting: machineSettingSchema,
  mets: computed<Mets>().nullable(),
  minutes: computed<Minutes>().nullable(),
});

/** What the next session starts with. */
export const nextStartSchema = z.object({
  load: loadSchema,
  /** `last-session`: nobody decided anything else. */
  from: z.enum(['accepted', 'edited', 'last-session']),
  /** Who decided, and when. */
  by: z.string().nullable(),
  at: instant.nullable(),
});
export type NextStart = z.infer<typeof nextStartSchema>;

const reasonCodes = Object.keys(progressionReasons) as [
  ProgressionReasonCode,
  ...ProgressionReasonCode[],
];

export const proposalSchema = z.object({
  id: z.uuid(),
  sessionRecordId: z.uuid(),
  /** Of the session, local to the site. */
  localDate: z.string(),
  action: z.enum(progressionActions),
  reasons: z.array(z.object({ code: z.enum(reasonCodes), text: z.string(), source: z.string() })),
  from: loadSchema.nullable(),
  to: loadSchema.nullable(),
  policyVersion: z.int(),
  engineVersion: z.string(),
  madeAt: instant,
  decision: z
    .object({
      kind: z.enum(['accepted', 'edited', 'dismissed']),
      load: loadSchema.nullable(),
      reason: z.string().nullable(),
      by: z.string(),
      at: instant,
    })
    .nullable(),
  /** False once a later session, another range or a withdrawal has overtaken it: then it can only be dismissed. */
  stands: z.boolean(),
});
export type Proposal = z.infer<typeof proposalSchema>;

/** `POST /api/progression-proposals/:id/decision` */
export const decisionRequestSchema = z.discriminatedUnion('decision', [
  z.strictObject({ decision: z.literal('accepted') }),
  z.strictObject({
    decision: z.literal('edited'),
    setting: machineSettingSchema,
    minutes: wholeNumberField(bounds.minutes, 'min').nullable(),
    reason: textField(200, 'Say why'),
  }),
  z.strictObject({ decision: z.literal('dismissed'), reason: textField(200, 'Say why') }),
]);
export type DecisionRequest = z.infer<typeof decisionRequestSchema>;

const rates = z.object({ lower: z.number(), upper: z.number() });

/** A signed session against the range that it was done under. */
const sessionSchema = z.object({
  sessionRecordId: z.uuid(),
  localDate: z.string(),
  /** At exercise; null when not read. */
  medianHeartRate: z.number().nullable(),
  highestHeartRate: z.number().nullable(),
  medianExertion: z.number().nullable(),
  load: loadSchema.nullable(),
  /** Null where effort led. */
  target: rates.nullable(),
  ceiling: z.number().nullable(),
  exertion: rates.nullable(),
});
export type CourseSession = z.infer<typeof sessionSchema>;

/** `GET /api/patients/:id/course-so-far`: the last sessions, the oldest first, and the latest proposal. */
export const courseSoFarSchema = z.object({
  sessions: z.array(sessionSchema),
  proposal: proposalSchema.nullable(),
  timeZone: z.string(),
});
export type CourseSoFar = z.infer<typeof courseSoFarSchema>;
