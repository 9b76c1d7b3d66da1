import { fileURLToPath } from 'node:url';
import { drizzle } from 'drizzle-orm/node-postgres';
import { migrate } from 'drizzle-orm/node-postgres/migrator';
import { runMigrations as migrateJobQueue } from 'graphile-worker';
import pg from 'pg';
import { grantToApp } from './grants';

/** Any constant will do, as long as every migrator of this product takes the same one. */
const MIGRATION_LOCK = 736_201_126;

/** The same two steps up from server/database/ and from the bundle in dist/server/. */
const OWN_MIGRATIONS = fileURLToPath(new URL('../../migrations', import.meta.url));

export interface MigrateOptions {
  /** What the server signs in as; it is given what it needs and no more. */
  readonly appRole?: string;
  readonly migrationsFolder?: string;
}

/**
 * Brings a database to the newest schema: our own migrations, the job queue's, then the app role's grants. Several may
 * start at once; they go one after the other. Safe to repeat.
 * @param ownerUrl connects as the role that owns, or will own, the tables
 * @throws when a migration fails; our own are one transaction, so that nothing of them is half done
 */
export async function migrateDatabase(
  ownerUrl: string,
  { appRole = 'plimsoll_app', migrationsFolder = OWN_MIGRATIONS }: MigrateOptions = {},
): Promise<void> {
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect();
  try {
    await client.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    await client.query('SET client_min_messages = warning');
    await client.query('CREATE EXTENSION IF NOT EXISTS btree_gist');
    await migrate(drizzle(client), { migrationsFolder });
    await migrateJobQueue({ connectionString: ownerUrl });
    await grantToApp(client, appRole);
  } finally {
    await client.end();
  }
}
