import * as z from 'zod';
import './zod';

/** 256 random bits in base64url. */
export const calendarParamsSchema = z.object({ token: z.string().regex(/^[\w-]{43}$/) });

/** An address that a calendar program reads by itself; a new one makes the former useless. */
export const calendarLinkSchema = z.object({ url: z.url() });
