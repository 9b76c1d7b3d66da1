import type { TestApp } from './test-app';

/** Rows that whoever changes them must lock. */
export interface Gate {
  readonly lock: string;
  readonly values: readonly unknown[];
  /** How many must stand before it before it opens; it opens after three seconds in any case. */
  readonly until: number;
}

const WAITING = `
  SELECT count(*)::int AS waiting FROM pg_stat_activity
   WHERE datname = current_database() AND wait_event_type = 'Lock'`;

/**
 * Holds rows until callers stand before them, and then lets all of them go at once: calls that only follow each other
 * closely would not meet.
 */
export async function throughGate<T>(
  { context }: TestApp,
  { lock, values, until }: Gate,
  callers: () => readonly PromiseLike<T>[],
): Promise<T[]> {
  const gate = await context.database.$client.connect();
  try {
    await gate.query('BEGIN');
    await gate.query(lock, [...values]);
    const calls = callers().map((call) => call.then((answer) => answer));
    for (let tries = 0; tries < 60; tries += 1) {
      // Within a transaction what was seen of others stays as it was seen.
      await gate.query('SELECT pg_stat_clear_snapshot()');
      const { rows } = await gate.query<{ waiting: number }>(WAITING);
      if ((rows[0]?.waiting ?? 0) >= until) break;
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    await gate.query('COMMIT');
    return await Promise.all(calls);
  } finally {
    gate.release();
  }
}
