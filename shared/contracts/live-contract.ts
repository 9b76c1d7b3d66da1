import * as z from 'zod';
import './zod';

/** What an open page may have to read again: a range with its flags, or a visit with its readings and next step. */
export const changeTopics = ['range', 'visit'] as const;
export type ChangeTopic = (typeof changeTopics)[number];

/** `data` of an event `change` of `GET /api/events`: ids alone, to be read again by whoever may. */
export const changeSchema = z.object({
  topic: z.enum(changeTopics),
  /** Null: anybody's. */
  patientId: z.uuid().nullable(),
});
export type Change = z.infer<typeof changeSchema>;
