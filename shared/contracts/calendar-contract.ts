import * as z from 'zod';
import { tokenField } from './fields';

export const calendarParamsSchema = z.object({ token: tokenField });

/** `GET /api/my/calendar-link`: when the address in use was made; the address itself is told only once. */
export const calendarStateSchema = z.object({
  madeAt: z.iso.datetime({ offset: true }).nullable(),
});
export type CalendarState = z.infer<typeof calendarStateSchema>;

/** An address that a calendar program reads by itself; a new one makes the former useless. */
export const calendarLinkSchema = z.object({ url: z.url() });
