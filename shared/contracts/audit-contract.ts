import * as z from 'zod';
import './zod';
import { cursorField, localDateField, pageOf } from './fields';

/** `GET /api/audit`, the newest first. */
export const auditQuerySchema = z
  .strictObject({
    cursor: cursorField.optional(),
    limit: z.coerce.number().int().min(1).max(100).default(50),
    /** Who did it. */
    actorId: z.uuid().optional(),
    /** Whose record it concerns. */
    patientId: z.uuid().optional(),
    /** The beginning of an action, as in `prescription.` or `sign-in`. */
    action: z
      .string()
      .regex(
        /^[a-z][a-z.-]{0,79}$/,
        'Use small letters, dots and hyphens, as in prescription.signed',
      )
      .optional(),
    /** The site whose calendar `from` and `to` are of. */
    siteId: z.uuid().optional(),
    /** Days of the site: `from` counts, `to` does not. */
    from: localDateField.optional(),
    to: localDateField.optional(),
  })
  .refine(({ siteId, from, to }) => siteId !== undefined || (from ?? to) === undefined, {
    path: ['siteId'],
    message: 'Choose the site whose days are meant',
  })
  .refine(({ from, to }) => from === undefined || to === undefined || from < to, {
    path: ['to'],
    message: '“To” must be after “from”; the last day is left out.',
  });
export type AuditQuery = z.infer<typeof auditQuerySchema>;

export const auditEventSchema = z.object({
  id: z.uuid(),
  at: z.iso.datetime({ offset: true }),
  /** Null for what a job did, or someone who was not signed in. */
  actor: z.object({ id: z.uuid(), displayName: z.string() }).nullable(),
  action: z.string(),
  outcome: z.enum(['success', 'refused', 'failure']),
  objectType: z.string(),
  objectId: z.string().nullable(),
  /** By the program's number alone, which tells nobody's name. */
  patient: z.object({ id: z.uuid(), recordNumber: z.string().nullable() }).nullable(),
  ip: z.string().nullable(),
  /** Ids and codes. */
  details: z.record(z.string(), z.unknown()).nullable(),
});
export type AuditEvent = z.infer<typeof auditEventSchema>;

export const auditResponseSchema = pageOf(auditEventSchema);
export type AuditResponse = z.infer<typeof auditResponseSchema>;
