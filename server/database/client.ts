import { drizzle } from 'drizzle-orm/node-postgres';
import type { NodePgDatabase } from 'drizzle-orm/node-postgres';
import { Pool } from 'pg';
import * as schema from './schema';

export type Database = NodePgDatabase<typeof schema> & { $client: Pool };

/** A transaction's own handle; the outer one must not be used inside. */
export type Transaction = Parameters<Parameters<Database['transaction']>[0]>[0];

/** What a query function takes: either handle serves for reading. */
export type Queryable = Database | Transaction;

/**
 * Opens a pool of connections on the app's role.
 * @param options.max connections at most (default 10)
 * @param options.statementTimeoutMs a statement that takes longer is ended by the server
 */
export function openDatabase(
  url: string,
  options: { max?: number; statementTimeoutMs?: number } = {},
): Database {
  const pool = new Pool({
    connectionString: url,
    max: options.max ?? 10,
    statement_timeout: options.statementTimeoutMs ?? 10_000,
    application_name: 'plimsoll',
  });
  return drizzle(pool, { schema, casing: 'snake_case' });
}
