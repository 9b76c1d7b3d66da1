import * as z from 'zod';
import { sexes } from '../clinical/prescribing/request';
import { withdrawalReasons } from '../clinical/withdrawal';
import { emailSchema } from './accounts-contract';
import {
  cursorField,
  localDateField,
  pageLimitField,
  pageOf,
  searchField,
  textField,
  timeZoneField,
  wholeNumberField,
} from './fields';
import { rangeFlagSchema } from './range-flag';

export const diagnosisKinds = [
  'heart-attack',
  'stent',
  'bypass',
  'valve',
  'transplant',
  'stable-angina',
  'heart-failure',
  'assist-device',
  'other',
] as const;
export const diagnosisKindSchema = z.enum(diagnosisKinds, 'Choose a diagnosis');
export type DiagnosisKind = z.infer<typeof diagnosisKindSchema>;

export const enrollmentStatuses = ['active', 'on-hold', 'completed', 'discontinued'] as const;
export const enrollmentStatusSchema = z.enum(enrollmentStatuses);
export type EnrollmentStatus = z.infer<typeof enrollmentStatusSchema>;

/** What stands out about a patient in a list; the first four are for those who read the chart. */
export const patientFlags = [
  'awaiting-physician',
  'range-withdrawn',
  'no-range',
  'review-due',
  'on-hold',
  'no-course',
] as const;
export const patientFlagSchema = z.enum(patientFlags);
export type PatientFlag = z.infer<typeof patientFlagSchema>;

const bpmRange = z.object({ lower: z.number(), upper: z.number() });

/** The range in force in short; with effort leading `target` is null. Rates in bpm, effort on Borg 6–20. */
export const rangeInForceSchema = z.object({
  prescriptionId: z.uuid(),
  leadBy: z.enum(['heart-rate', 'perceived-exertion']),
  target: bpmRange.nullable(),
  ceiling: z.number().nullable(),
  perceivedExertion: bpmRange,
  since: z.iso.datetime({ offset: true }),
});
export type RangeInForce = z.infer<typeof rangeInForceSchema>;

const siteSchema = z.object({ id: z.uuid(), name: z.string(), timeZone: z.string() });

/** `POST /api/patients/search`: words of a name or number, each any beginning; a birth year or date narrows. */
export const patientSearchRequestSchema = z.strictObject({
  q: searchField(100).optional(),
  cursor: cursorField.nullish(),
  limit: pageLimitField,
});
export type PatientSearchRequest = z.input<typeof patientSearchRequestSchema>;

const courseSchema = z.object({
  enrollmentId: z.uuid(),
  status: enrollmentStatusSchema,
  attended: z.number(),
  planned: z.number(),
});

export const patientListItemSchema = z.object({
  id: z.uuid(),
  displayName: z.string(),
  familyName: z.string(),
  givenName: z.string(),
  recordNumber: z.string(),
  birthDate: z.string(),
  ageYears: z.number(),
  site: siteSchema,
  /** The course that runs, else the last; null before the first. */
  course: courseSchema.nullable(),
  /** Null for callers who don't read the chart, and where there is none in force. */
  range: rangeInForceSchema.nullable(),
  flags: z.array(patientFlagSchema),
});
export type PatientListItem = z.infer<typeof patientListItemSchema>;

export const patientSearchResponseSchema = pageOf(patientListItemSchema);
export type PatientSearchResponse = z.infer<typeof patientSearchResponseSchema>;

export const enrollmentSchema = z.object({
  id: z.uuid(),
  /** 1 for the patient's first course. */
  number: z.number(),
  site: siteSchema,
  phase: z.number(),
  status: enrollmentStatusSchema,
  enrolledOn: z.string(),
  closedOn: z.string().nullable(),
  closedReason: z.string().nullable(),
  payer: z.string(),
  plannedSessions: z.number(),
  sessionLimit: z.number(),
  dailyLimit: z.number(),
  monitored: z.boolean(),
  booked: z.number(),
  attended: z.number(),
  firstSessionOn: z.string().nullable(),
  lastSessionOn: z.string().nullable(),
  /** Null for callers who don't read the chart. */
  qualifying: z.object({ diagnosis: diagnosisKindSchema, eventOn: z.string() }).nullable(),
  version: z.number(),
});
export type Enrollment = z.infer<typeof enrollmentSchema>;

/** `GET /api/patients/:id` */
export const patientSchema = z.object({
  id: z.uuid(),
  version: z.number(),
  recordNumber: z.string(),
  displayName: z.string(),
  familyName: z.string(),
  givenName: z.string(),
  birthDate: z.string(),
  ageYears: z.number(),
  sexAtBirth: z.enum(sexes),
  email: z.string().nullable(),
  phone: z.string().nullable(),
  /** The patient's own, null when it is the site's. */
  timeZone: z.string().nullable(),
  site: siteSchema,
  /** The site's date of today, which dates of the record are entered against. */
  today: z.string(),
  account: z.enum(['none', 'invited', 'active']),
  /** Newest first. */
  enrollments: z.array(enrollmentSchema),
  /** Null for callers who don't read the chart. */
  clinical: z
    .object({
      risk: z
        .object({ level: z.enum(['low', 'moderate', 'high', 'unknown']), assessedOn: z.string() })
        .nullable(),
      range: rangeInForceSchema.nullable(),
      /** Why the range no longer holds; [] while it does. */
      withdrawn: z.array(z.enum(withdrawalReasons)),
      /** Each cause that touches the range, the oldest first. */
      rangeFlags: z.array(rangeFlagSchema),
      flags: z.array(patientFlagSchema),
    })
    .nullable(),
});
export type Patient = z.infer<typeof patientSchema>;

const demographics = {
  recordNumber: textField(40, 'Enter the record number'),
  familyName: textField(100, 'Enter the family name'),
  givenName: textField(100, 'Enter the given name'),
  birthDate: localDateField,
  sexAtBirth: z.enum(sexes, 'Choose the sex recorded at birth'),
  email: emailSchema.nullable().default(null),
  phone: textField(40).nullable().default(null),
  timeZone: timeZoneField.nullable().default(null),
  siteId: z.uuid('Choose a site'),
};

/** `POST /api/patients` → 201 with the patient. */
export const registerPatientRequestSchema = z.strictObject(demographics);
export type RegisterPatientRequest = z.input<typeof registerPatientRequestSchema>;

/** `PATCH /api/patients/:id`: what is left out stays; a patient may change the time zone alone. */
export const changePatientRequestSchema = z.strictObject({
  version: z.int(),
  recordNumber: demographics.recordNumber.optional(),
  familyName: demographics.familyName.optional(),
  givenName: demographics.givenName.optional(),
  birthDate: demographics.birthDate.optional(),
  sexAtBirth: demographics.sexAtBirth.optional(),
  email: emailSchema.nullable().optional(),
  phone: textField(40).nullable().optional(),
  timeZone: timeZoneField.nullable().optional(),
  siteId: demographics.siteId.optional(),
});
export type ChangePatientRequest = z.infer<typeof changePatientRequestSchema>;

const sessions = wholeNumberField({ lowest: 1, highest: 72 }, 'sessions').default(36);

/** `POST /api/patients/:id/enrollments` → 201; 409 `already-enrolled` while a course of the phase runs. */
export const openEnrollmentRequestSchema = z
  .strictObject({
    siteId: z.uuid('Choose a site'),
    phase: z.int().min(2).max(3).default(2),
    qualifyingDiagnosis: diagnosisKindSchema,
    qualifyingEventOn: localDateField,
    payer: textField(80, 'Enter who pays'),
    enrolledOn: localDateField,
    plannedSessions: sessions,
    sessionLimit: sessions,
    dailyLimit: z.int().min(1, 'Enter 1 or 2').max(2, 'Enter 1 or 2').default(2),
    monitored: z.boolean().default(true),
  })
  .refine((course) => course.qualifyingEventOn <= course.enrolledOn, {
    path: ['qualifyingEventOn'],
    error: 'The event comes before the enrollment',
  })
  .refine((course) => course.plannedSessions <= course.sessionLimit, {
    path: ['plannedSessions'],
    error: 'Plan no more sessions than the limit',
  });
export type OpenEnrollmentRequest = z.input<typeof openEnrollmentRequestSchema>;

/** `PATCH /api/patients/:id/enrollments/:enrollmentId`; a course that ended says when and why. */
export const changeEnrollmentRequestSchema = z
  .strictObject({
    version: z.int(),
    status: enrollmentStatusSchema.optional(),
    closedOn: localDateField.optional(),
    closedReason: textField(200, 'Say why the course ends').optional(),
    payer: textField(80, 'Enter who pays').optional(),
    monitored: z.boolean().optional(),
  })
  .refine((change) => !isClosed(change.status) || change.closedOn !== undefined, {
    path: ['closedOn'],
    error: 'Enter the date the course ended',
  })
  .refine((change) => !isClosed(change.status) || change.closedReason !== undefined, {
    path: ['closedReason'],
    error: 'Say why the course ends',
  });
export type ChangeEnrollmentRequest = z.infer<typeof changeEnrollmentRequestSchema>;

function isClosed(status: EnrollmentStatus | undefined): boolean {
  return status === 'completed' || status === 'discontinued';
}
