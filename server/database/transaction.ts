import { DrizzleQueryError } from 'drizzle-orm';
import pg, { type PoolClient } from 'pg';
import { handleOf, type Database, type Transaction } from './client';

/** Serialization failure and deadlock: the whole transaction may be done again. */
const RETRIABLE = new Set(['40001', '40P01']);
const MAXIMUM_RETRIES = 3;

type Effect = () => void | Promise<void>;

/** Making a handle costs more than a query, and a pool hands the same connections out again. */
const handles = new WeakMap<PoolClient, ReturnType<typeof handleOf<PoolClient>>>();

function handleFor(connection: PoolClient) {
  const known = handles.get(connection);
  if (known) return known;
  const handle = handleOf(connection);
  handles.set(connection, handle);
  return handle;
}

/** The database's own error behind what Drizzle throws, undefined when the error is another. */
export function databaseErrorOf(error: unknown): pg.DatabaseError | undefined {
  const cause = error instanceof DrizzleQueryError ? error.cause : error;
  return cause instanceof pg.DatabaseError ? cause : undefined;
}

/** The name of the constraint that refused a write, undefined when the error is another. */
export const constraintOf = (error: unknown): string | undefined =>
  databaseErrorOf(error)?.constraint;

function isRetriable(error: unknown): boolean {
  const code = databaseErrorOf(error)?.code;
  return code !== undefined && RETRIABLE.has(code);
}

/** Waits longer each time, by chance, so that those who met do not meet again. */
function pauseBefore(attempt: number): Promise<void> {
  const ms = 10 * 2 ** attempt * (0.5 + Math.random());
  return new Promise((resolve) => setTimeout(resolve, ms));
}

async function attemptOnce<T>(
  database: Database,
  work: (tx: Transaction) => Promise<T>,
): Promise<{ result: T; effects: Effect[] }> {
  const connection = await database.$client.connect();
  const effects: Effect[] = [];
  const tx = Object.assign(Object.create(handleFor(connection)) as Transaction, {
    connection,
    afterCommit: (effect: Effect) => void effects.push(effect),
  });
  let broken: Error | undefined;
  try {
    await connection.query('BEGIN');
    const result = await work(tx);
    await connection.query('COMMIT');
    return { result, effects };
  } catch (error) {
    await connection.query('ROLLBACK').catch((failed: Error) => (broken = failed));
    throw error;
  } finally {
    // A connection that cannot even roll back is closed, not given to the next caller.
    connection.release(broken);
  }
}

async function untilCommitted<T>(
  database: Database,
  work: (tx: Transaction) => Promise<T>,
): Promise<{ result: T; effects: Effect[] }> {
  for (let attempt = 0; ; attempt += 1) {
    try {
      return await attemptOnce(database, work);
    } catch (error) {
      if (attempt >= MAXIMUM_RETRIES || !isRetriable(error)) throw error;
      await pauseBefore(attempt);
    }
  }
}

/**
 * Runs work in one transaction at READ COMMITTED. A deadlock or serialization failure does the whole work again, at
 * most three times, so the work must have no effect outside the database but through `tx.afterCommit`.
 * @throws what the work throws, after the rollback; what an after-commit effect throws, with the work committed
 */
export async function inTransaction<T>(
  database: Database,
  work: (tx: Transaction) => Promise<T>,
): Promise<T> {
  const { result, effects } = await untilCommitted(database, work);
  for (const effect of effects) await effect();
  return result;
}
