import * as z from 'zod';
import { withdrawalReasons } from '../clinical/withdrawal';
import { diagnosisKindSchema, enrollmentStatusSchema } from './patients-contract';
import { prescriptionPolicySchema } from './policy-contract';
import { prescribingInputsSchema } from './prescribing-inputs-contract';
import { rangeFlagSchema } from './range-flag';

// What a worksheet begins with, and whose range it is.

const instant = z.iso.datetime({ offset: true });

/** Whom a range is for, as pages name them; two identifiers and more. */
export const rangePatientSchema = z.object({
  id: z.uuid(),
  displayName: z.string(),
  recordNumber: z.string(),
  birthDate: z.string(),
  ageYears: z.number(),
  site: z.object({ id: z.uuid(), name: z.string(), timeZone: z.string() }),
});
export type RangePatient = z.infer<typeof rangePatientSchema>;

export const rangeCourseSchema = z.object({
  status: enrollmentStatusSchema,
  attended: z.number(),
  planned: z.number(),
  diagnosis: diagnosisKindSchema,
  eventOn: z.string(),
});
export type RangeCourse = z.infer<typeof rangeCourseSchema>;

/** `GET /api/patients/:id/worksheet` */
export const worksheetSchema = z.object({
  patient: rangePatientSchema,
  /** The course that runs, else the last; null before the first. */
  course: rangeCourseSchema.nullable(),
  /** The site's date of today. */
  today: z.string(),
  /** What the record says today. */
  record: prescribingInputsSchema,
  /** The policy in force, by which the page works out the same numbers as the server. */
  policy: prescriptionPolicySchema,
  /** Whether no range was in force yet in the course: a physician then signs too. */
  first: z.boolean(),
  /** Whether the caller is a student, whose signature waits for a physician's. */
  student: z.boolean(),
  inForce: z
    .object({
      prescriptionId: z.uuid(),
      activatedAt: instant,
      withdrawn: z.array(z.enum(withdrawalReasons)),
      reviewDue: z.boolean(),
      /** Each cause that touches it, the oldest first. */
      flags: z.array(rangeFlagSchema),
    })
    .nullable(),
  /** The highest rate at exercise of the last signed session. */
  lastPeak: z.object({ heartRate: z.number(), on: z.string() }).nullable(),
});
export type Worksheet = z.infer<typeof worksheetSchema>;
