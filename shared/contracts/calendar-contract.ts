import * as z from 'zod';
import { tokenField } from './fields';

export const calendarParamsSchema = z.object({ token: tokenField });

/** An address that a calendar program reads by itself; a new one makes the former useless. */
export const calendarLinkSchema = z.object({ url: z.url() });
