import * as z from 'zod';
import { cursorField, pageLimitField, pageOf } from './fields';

/** A reading as it was logged; one that was amended stays, and its amendment names it. */
const readingSchema = z.object({
  id: z.uuid(),
  phase: z.enum(['resting', 'exercise', 'recovery']),
  measuredAt: z.iso.datetime({ offset: true }),
  heartRate: z.number().nullable(),
  systolic: z.number().nullable(),
  diastolic: z.number().nullable(),
  oxygenSaturation: z.number().nullable(),
  perceivedExertion: z.number().nullable(),
  symptoms: z.array(z.string()),
  note: z.string().nullable(),
  placement: z.enum(['below', 'in', 'above', 'over-ceiling']).nullable(),
  status: z.enum(['preliminary', 'final', 'amended', 'entered-in-error']),
  amends: z.uuid().nullable(),
  amendmentReason: z.string().nullable(),
  recordedBy: z.string(),
});
export type VitalReading = z.infer<typeof readingSchema>;

const sessionSchema = z.object({
  sessionRecordId: z.uuid(),
  startedAt: z.iso.datetime({ offset: true }),
  localDate: z.string(),
  timeZone: z.string(),
  signedAt: z.iso.datetime({ offset: true }).nullable(),
  signedBy: z.string().nullable(),
  /** In the order of measuring. */
  readings: z.array(readingSchema),
});
export type VitalsSession = z.infer<typeof sessionSchema>;

/** `GET /api/patients/:id/vital-signs`: a page of sessions, the newest first. */
export const vitalsHistoryQuerySchema = z.strictObject({
  cursor: cursorField.optional(),
  limit: z.coerce.number().pipe(pageLimitField.unwrap()).default(25),
});
export const vitalsHistoryResponseSchema = pageOf(sessionSchema);
export type VitalsHistory = z.infer<typeof vitalsHistoryResponseSchema>;
