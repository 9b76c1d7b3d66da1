import * as z from 'zod';
import './zod';

/** `GET /api/follow-ups`: who is to be spoken with today, the longest waiting first; at most 100. */
export const followUpsSchema = z.object({
  items: z.array(
    z.object({
      /** The questionnaire's entry in the record. */
      id: z.uuid(),
      patient: z.object({
        id: z.uuid(),
        displayName: z.string(),
        recordNumber: z.string(),
        phone: z.string().nullable(),
        site: z.object({ name: z.string(), timeZone: z.string() }),
      }),
      answeredOn: z.string(),
      /** 1 several days, 2 more than half the days, 3 nearly every day. */
      answer: z.int(),
      recordedAt: z.iso.datetime({ offset: true }),
      recordedBy: z.string(),
    }),
  ),
});
export type FollowUp = z.infer<typeof followUpsSchema>['items'][number];
