import { drizzle } from 'drizzle-orm/node-postgres';
import type { NodePgDatabase } from 'drizzle-orm/node-postgres';
import { Pool, type PoolClient } from 'pg';
import * as schema from './schema';

type Handle = NodePgDatabase<typeof schema>;

export type Database = Handle & { $client: Pool };

/** What a query function takes: a database or a transaction serves alike. */
export type Queryable = Omit<Handle, 'transaction'>;

/** A transaction's own handle, made by `inTransaction`; the database must not be used inside. */
export interface Transaction extends Queryable {
  /** For statements prepared by name on hot paths; it belongs to the transaction alone. */
  readonly connection: PoolClient;
  /** Runs once the transaction is committed, never when it is rolled back. */
  readonly afterCommit: (effect: () => void | Promise<void>) => void;
}

/** Wraps a pool, or one connection of it, in typed queries. */
export const handleOf = <Client extends Pool | PoolClient>(client: Client) =>
  drizzle(client, { schema, casing: 'snake_case' });

export interface DatabaseOptions {
  /** Connections at most (default 10). */
  readonly max?: number;
  /** A statement that takes longer is ended by the server (default 10,000). */
  readonly statementTimeoutMs?: number;
  /** Told when a connection breaks; the pool replaces it by itself. */
  readonly onConnectionLost?: (error: Error) => void;
}

/** Opens a pool of connections; a caller waits at most 5 s for a free one. */
export function openDatabase(url: string, options: DatabaseOptions = {}): Database {
  const pool = new Pool({
    connectionString: url,
    max: options.max ?? 10,
    connectionTimeoutMillis: 5_000,
    statement_timeout: options.statementTimeoutMs ?? 10_000,
    application_name: 'plimsoll',
  });
  // Without listeners a lost connection, idle or in use, would end the process.
  const lost = (error: Error): void => options.onConnectionLost?.(error);
  pool.on('error', lost);
  pool.on('connect', (client) => client.on('error', lost));
  return handleOf(pool);
}
