import * as z from 'zod';
import { prescriptionAnswerSchema } from './prescription-answer';
import { prescriptionRequestSchema } from './prescription-request';

// A prescription as it is kept: a draft, signed, in force, and superseded, with all that its numbers rest on.

/** FHIR R4 request status. */
export const prescriptionStatuses = [
  'draft',
  'active',
  'completed',
  'revoked',
  'entered-in-error',
] as const;

const signatory = z.object({ id: z.uuid(), displayName: z.string() });
const instant = z.iso.datetime({ offset: true });

export const prescriptionSchema = z.object({
  id: z.uuid(),
  patientId: z.uuid(),
  status: z.enum(prescriptionStatuses),
  /** Counts the changes; a caller sends back the one that it has seen. */
  version: z.int(),
  inputs: prescriptionRequestSchema,
  result: prescriptionAnswerSchema,
  policyVersion: z.int(),
  engineVersion: z.string(),
  createdAt: instant,
  createdBy: signatory,
  /** When the inputs were last changed, null while they are as first written. */
  changedAt: instant.nullable(),
  signedAt: instant.nullable(),
  signedBy: signatory.nullable(),
  /** Who must still sign before the range enters into force. */
  awaiting: z.literal('physician').nullable(),
  physicianSignedAt: instant.nullable(),
  physicianSignedBy: signatory.nullable(),
  activatedAt: instant.nullable(),
  endedAt: instant.nullable(),
  supersedes: z.uuid().nullable(),
});
export type Prescription = z.infer<typeof prescriptionSchema>;

export const prescriptionListSchema = z.object({
  items: z.array(prescriptionSchema),
  nextCursor: z.string().nullable(),
});

export const draftRequestSchema = z.strictObject({ inputs: prescriptionRequestSchema });
export const changeDraftRequestSchema = z.strictObject({
  inputs: prescriptionRequestSchema,
  version: z.int().min(1),
});
export const versionRequestSchema = z.strictObject({ version: z.int().min(1) });
