import * as z from 'zod';
import { errorStatus, type ErrorCode } from '../errors';
import './zod';

const codes = Object.keys(errorStatus) as [ErrorCode, ...ErrorCode[]];

/** The body of every failure: `application/problem+json`. */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.enum(codes),
  /** Stands in the server's log too. */
  id: z.string(),
  errors: z.array(z.object({ path: z.string(), code: z.string(), message: z.string() })),
});
