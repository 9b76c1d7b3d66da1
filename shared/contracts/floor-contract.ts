import * as z from 'zod';
import { placements } from '../clinical/placement';
import { leads, limitKinds } from '../clinical/prescribing';
import { restrictionKinds } from '../clinical/training/restrictions';
import { vitalPhases, vitalSignBounds } from '../clinical/vital-sign-bounds';
import { instantField, noteField, textField, wholeNumberField } from './fields';
import { appointmentStatusSchema } from './schedule-contract';
import { boutSchema, nextStartSchema } from './progression-contract';
import { rangeFlagSchema } from './range-flag';

const instant = z.iso.datetime({ offset: true });

/** An instant as people send it: a clock that was never set is refused. */
const sentInstant = instantField.refine((at) => at >= '2000', 'Check the clock of this device');

/** Made by the client, so that sending again is the same write. */
const clientId = z.uuid('Make a UUID for this');

/** What a patient is told from another by; two of these stand before the first entry. */
export const patientIdentifiers = ['name', 'birth-date', 'record-number'] as const;
export type PatientIdentifier = (typeof patientIdentifiers)[number];

/** `PUT /api/session-records/:id` → 201 first, 200 the same again. */
export const beginRecordRequestSchema = z.strictObject({
  appointmentId: z.uuid(),
  startedAt: sentInstant,
  /** What the patient was identified by; our own pages always say. */
  identityConfirmedWith: z
    .array(z.enum(patientIdentifiers))
    .min(2, 'Confirm two identifiers')
    .refine((given) => new Set(given).size === given.length, 'Name each identifier once')
    .nullish(),
});
export type BeginRecordRequest = z.infer<typeof beginRecordRequestSchema>;

/** What our own pages offer; `none` means that the patient was asked and had none. Others may send words of their own. */
export const symptomCodes = [
  'none',
  'chest-discomfort',
  'shortness-of-breath',
  'dizziness',
  'palpitations',
  'leg-pain',
  'unusual-fatigue',
  'nausea',
] as const;
export type SymptomCode = (typeof symptomCodes)[number];

const number = (sign: keyof typeof vitalSignBounds, unit: string) =>
  wholeNumberField(vitalSignBounds[sign], unit).nullish();

const measured = {
  heartRate: number('heartRate', 'bpm'),
  systolic: number('systolic', 'mmHg'),
  diastolic: number('diastolic', 'mmHg'),
  oxygenSaturation: number('oxygenSaturation', '%'),
  perceivedExertion: number('perceivedExertion', ''),
  symptoms: z
    .array(textField(60, 'Name the symptom'))
    .max(20)
    .refine((given) => !given.includes('none') || given.length === 1, 'None stands alone')
    .nullish(),
  note: noteField(2000).nullish(),
};

type Measured = z.infer<z.ZodObject<typeof measured>>;

const vitalSigns = Object.keys(vitalSignBounds) as (keyof typeof vitalSignBounds)[];

const isAbsent = (value: unknown): boolean => value === null || value === undefined;

const isEmpty = (reading: Measured): boolean =>
  vitalSigns.every((sign) => isAbsent(reading[sign])) && !reading.symptoms?.length && !reading.note;

/** What fields alone cannot say: a diastolic pressure stands below a systolic one. */
function checkPressure({ systolic, diastolic }: Measured, context: z.RefinementCtx): void {
  const refuse = (path: string, message: string) =>
    context.addIssue({ code: 'custom', path: [path], message });
  if (diastolic === null || diastolic === undefined) return;
  if (systolic === null || systolic === undefined)
    refuse('systolic', 'Enter the systolic pressure too');
  else if (diastolic >= systolic) refuse('diastolic', 'Diastolic must be below systolic');
}

function checkMeasured(reading: Measured, context: z.RefinementCtx): void {
  checkPressure(reading, context);
  if (!isEmpty(reading)) return;
  context.addIssue({ code: 'custom', path: ['heartRate'], message: 'Enter at least one value' });
}

const phase = z.enum(vitalPhases, 'Choose resting, exercise or recovery');

/** `PUT /api/vital-signs/:id` → 201 first, 200 the same again. */
export const readingRequestSchema = z
  .strictObject({ sessionRecordId: z.uuid(), phase, measuredAt: sentInstant, ...measured })
  .superRefine(checkMeasured);
export type ReadingRequest = z.infer<typeof readingRequestSchema>;

/**
 * `POST /api/vital-signs/:id/amendments`: the whole reading as it should have been; phase and time stay when left out.
 * One that never was this patient's is `enteredInError` and holds no values.
 */
export const amendmentRequestSchema = z
  .strictObject({
    id: clientId,
    reason: textField(200, 'Say why'),
    sessionRecordId: z.uuid().optional(),
    phase: phase.optional(),
    measuredAt: sentInstant.optional(),
    enteredInError: z.boolean().optional(),
    ...measured,
  })
  .superRefine((amendment, context) => {
    if (!amendment.enteredInError) return checkMeasured(amendment, context);
    if (isEmpty(amendment)) return;
    context.addIssue({
      code: 'custom',
      path: ['enteredInError'],
      message: 'A reading entered in error holds no values',
    });
  });
export type AmendmentRequest = z.infer<typeof amendmentRequestSchema>;

/** A reading as it is stored; one that was amended stays, and its amendment names it. */
export const readingSchema = z.object({
  id: z.uuid(),
  sessionRecordId: z.uuid(),
  phase: z.enum(vitalPhases),
  measuredAt: instant,
  heartRate: z.int().nullable(),
  systolic: z.int().nullable(),
  diastolic: z.int().nullable(),
  oxygenSaturation: z.int().nullable(),
  perceivedExertion: z.int().nullable(),
  symptoms: z.array(z.string()),
  note: z.string().nullable(),
  placement: z.enum(placements).nullable(),
  /** `preliminary` is a student's, until the record is signed. */
  status: z.enum(['preliminary', 'final', 'amended', 'entered-in-error']),
  amends: z.uuid().nullable(),
  amendmentReason: z.string().nullable(),
  receivedAt: instant,
  recordedBy: z.string(),
});
export type Reading = z.infer<typeof readingSchema>;

/** `PUT /api/appointments/:id/missed-dose`: whether the patient came without the day's dose of a rate-acting drug. */
export const missedDoseSchema = z.strictObject({ missed: z.boolean() });

/** `POST /api/session-records/:id/sign`; signing again answers the first signature. */
export const signRecordRequestSchema = z
  .strictObject({
    /** False for a patient who was held at the door. When left out: whether a reading at exercise is there. */
    exercised: z.boolean().optional(),
  })
  .optional();

const recordFacts = {
  id: z.uuid(),
  startedAt: instant,
  identityConfirmedWith: z.array(z.enum(patientIdentifiers)).nullable(),
  recordedBy: z.string(),
  signedAt: instant.nullable(),
  signedBy: z.string().nullable(),
};

/** One visit on the floor with its readings, in the order of measuring. */
export const sessionRecordSchema = z.object({
  ...recordFacts,
  appointmentId: z.uuid(),
  patientId: z.uuid(),
  /** The range in force when the record began, which its readings are placed against. */
  prescriptionId: z.uuid().nullable(),
  exercised: z.boolean().nullable(),
  readings: z.array(readingSchema),
});
export type SessionRecord = z.infer<typeof sessionRecordSchema>;

const bpmRange = z.object({ lower: z.number(), upper: z.number() }).nullable();

export const floorFlags = ['pacemaker', 'insulin', 'irregular-rhythm', 'range-changed'] as const;
export type FloorFlag = (typeof floorFlags)[number];

/**
 * One patient of a class. The range is the one that the record is read against, before that the one in force; null
 * throughout when there is none. A withdrawn range has no target: effort leads, its ceiling stays.
 */
export const rosterItemSchema = z.object({
  appointmentId: z.uuid(),
  patientId: z.uuid(),
  displayName: z.string(),
  familyName: z.string(),
  recordNumber: z.string(),
  birthDate: z.iso.date(),
  status: appointmentStatusSchema,
  /** Of the appointment, for changing its status. */
  version: z.int(),
  monitored: z.boolean(),
  arrivedAt: instant.nullable(),
  checkedInAt: instant.nullable(),
  prescriptionId: z.uuid().nullable(),
  leadBy: z.enum(leads).nullable(),
  target: bpmRange,
  guide: bpmRange,
  ceiling: z.object({ value: z.number(), bindingLimits: z.array(z.enum(limitKinds)) }).nullable(),
  askLine: z.number().nullable(),
  perceivedExertion: z
    .object({ scale: z.literal('borg-6-20'), lower: z.number(), upper: z.number() })
    .nullable(),
  pressureCeiling: z.object({ systolic: z.number(), diastolic: z.number() }).nullable(),
  oxygenFloor: z.number().nullable(),
  restingHeartRate: z.number().nullable(),
  /** Why the range leads no more: something was entered in the record after it was made. */
  withdrawn: z.array(z.string()),
  /** Each cause that touches the range in force now, the oldest first. */
  rangeFlags: z.array(rangeFlagSchema),
  /** What this session starts with; null before the first. */
  nextStart: nextStartSchema.nullable(),
  /** The work of this visit as it was written down last. */
  work: boutSchema.pick({ setting: true, minutes: true, shortBouts: true }).nullable(),
  icd: z.object({
    status: z.enum(['none', 'present', 'unknown']),
    /** The lowest rate, bpm, at which it acts or listens. */
    lowestRate: z.number().nullable(),
  }),
  flags: z.array(z.enum(floorFlags)),
  /** What may not be done, ordered or by the program's policy. */
  restrictions: z.array(
    z.object({
      kind: z.enum(restrictionKinds),
      title: z.string(),
      words: z.string(),
      byPolicy: z.boolean(),
    }),
  ),
  record: z.object(recordFacts).nullable(),
  /** All of this visit, in the order of measuring. */
  readings: z.array(readingSchema),
});
export type RosterItem = z.infer<typeof rosterItemSchema>;

/** `GET /api/class-dates/:id/roster`, in the order in which places were given: it never moves. */
export const rosterResponseSchema = z.object({
  items: z.array(rosterItemSchema),
  /** Patients of other sites, whose records the caller may not open. */
  notShown: z.int(),
  /** The server's clock, against which a tablet checks its own. */
  at: instant,
});
export type Roster = z.infer<typeof rosterResponseSchema>;

/** `GET /api/class-dates/:id/roster/stamp`: differs when anything of the roster's visits has changed; tells of nobody. */
export const rosterStampSchema = z.object({ stamp: z.string() });
