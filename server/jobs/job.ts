import { sql } from 'drizzle-orm';
import type * as z from 'zod';
import type { AppContext } from '../app-context';
import type { Queryable } from '../database/client';

export interface JobDefinition {
  /** Kebab-case; what `addJob` calls it by. */
  readonly name: string;
  readonly payload: z.ZodType;
  /** When it runs by itself, as five crontab fields in UTC; its payload is then {}. */
  readonly schedule?: string;
  /** Whether it also runs when a server starts, so that a program that was off catches up at once. */
  readonly atStart?: true;
  readonly run: (payload: unknown, context: AppContext) => Promise<void>;
}

/**
 * Declares a job. It may run more than once, at once on several machines, and long after it was added: what it does
 * must be safe to repeat, and what it knows it must read again.
 */
export function job<P extends z.ZodType>(definition: {
  readonly name: string;
  readonly payload: P;
  readonly schedule?: string;
  readonly atStart?: true;
  readonly run: (payload: z.output<P>, context: AppContext) => Promise<void>;
}): JobDefinition {
  const { payload, run } = definition;
  return { ...definition, run: (given, context) => run(payload.parse(given), context) };
}

export interface JobOptions {
  /** A job that waits under the same key is replaced. */
  readonly jobKey?: string;
  readonly runAt?: Date;
  /** How often it is tried (default 25, further apart each time). */
  readonly maxAttempts?: number;
}

/** Adds a job in the caller's transaction: it runs if, and only if, that is committed. */
export async function addJob(
  tx: Queryable,
  name: string,
  payload: Readonly<Record<string, unknown>>,
  { jobKey, runAt, maxAttempts }: JobOptions = {},
): Promise<void> {
  await tx.execute(sql`
    SELECT graphile_worker.add_job(${name}::text, payload => ${JSON.stringify(payload)}::json,
      run_at => ${runAt?.toISOString() ?? null}::timestamptz, max_attempts => ${maxAttempts ?? null}::int,
      job_key => ${jobKey ?? null}::text)`);
}
