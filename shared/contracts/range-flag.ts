import * as z from 'zod';
import { prescriptionFacts } from '../clinical/prescribing/effect-of-fact';
import './zod';

/** One cause that touches a range in force: what was saved, by whom and when. */
export const rangeFlagSchema = z.object({
  fact: z.enum(prescriptionFacts),
  effect: z.enum(['withdrawn', 'review-due', 'stop', 'effort-today']),
  /** Of what exactly; null where the fact says it all. */
  detail: z.string().nullable(),
  at: z.iso.datetime({ offset: true }),
  /** Null for days that have passed. */
  by: z.string().nullable(),
});
