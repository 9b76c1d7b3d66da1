import { createHash, createHmac } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import pg from 'pg';
import { APP_ROLE, ensureRoles, OWNER_ROLE } from '../../scripts/postgres/roles.mjs';
import { migrateDatabase } from '../../server/database/migrate';

const TEMPLATE_LOCK = 736_201_127;

/** Whatever decides what a migrated database looks like. */
const SOURCES = ['migrations', 'server/database/migrate.ts', 'server/database/grants.ts'];

/** Where specs find the test server, and the template that they clone. */
export interface TestServer {
  readonly superuserUrl: string;
  readonly template: string;
}

const root = new URL('../../', import.meta.url);

function filesOf(source: string): string[] {
  const path = fileURLToPath(new URL(source, root));
  if (source.endsWith('.ts')) return [path];
  return readdirSync(path, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.(sql|json)$/.test(name))
    .sort()
    .map((name) => `${path}/${name}`);
}

function templateName(): string {
  const hash = createHash('sha256');
  for (const file of SOURCES.flatMap(filesOf)) hash.update(readFileSync(file));
  return `plimsoll_template_${hash.digest('hex').slice(0, 16)}`;
}

/** The roles' passwords follow from the superuser's, so that every process that knows it knows them. */
function rolePassword(superuserUrl: string, role: string): string {
  const { password } = new URL(superuserUrl);
  return createHmac('sha256', password).update(role).digest('hex');
}

/** The address of a database in the test server, signed in as one of the two roles. */
export function roleUrl(superuserUrl: string, role: string, database: string): string {
  const url = new URL(superuserUrl);
  url.username = role;
  url.password = rolePassword(superuserUrl, role);
  url.pathname = `/${database}`;
  return url.toString();
}

/** Runs work on one connection as the superuser. */
export async function asSuperuser<T>(
  superuserUrl: string,
  work: (client: pg.Client) => Promise<T>,
): Promise<T> {
  const client = new pg.Client({ connectionString: superuserUrl });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

async function dropDatabases(client: pg.Client, names: readonly string[]): Promise<void> {
  for (const name of names) {
    await client.query(`ALTER DATABASE ${client.escapeIdentifier(name)} IS_TEMPLATE false`);
    await client.query(`DROP DATABASE ${client.escapeIdentifier(name)} WITH (FORCE)`);
  }
}

async function databasesLike(client: pg.Client, pattern: string): Promise<string[]> {
  const found = await client.query<{ datname: string }>(
    'SELECT datname FROM pg_database WHERE datname LIKE $1',
    [pattern],
  );
  return found.rows.map((row) => row.datname);
}

/** Migrates beside its place and renames when whole, so that a broken migration never becomes the template. */
async function buildTemplate(client: pg.Client, superuserUrl: string, name: string): Promise<void> {
  const building = `${name}_new`;
  await dropDatabases(client, await databasesLike(client, 'plimsoll\\_template\\_%'));
  await client.query(`CREATE DATABASE ${building} OWNER ${OWNER_ROLE}`);
  await migrateDatabase(roleUrl(superuserUrl, OWNER_ROLE, building), { appRole: APP_ROLE });
  await client.query(`ALTER DATABASE ${building} RENAME TO ${name}`);
  await client.query(`ALTER DATABASE ${name} IS_TEMPLATE true ALLOW_CONNECTIONS false`);
}

/**
 * Makes the roles and the template database of today's migrations where they are missing; safe to call at once from
 * several processes.
 * @param superuserUrl of a server in which nothing matters
 */
export async function prepareTemplate(superuserUrl: string): Promise<TestServer> {
  const template = templateName();
  await asSuperuser(superuserUrl, async (client) => {
    await client.query('SELECT pg_advisory_lock($1)', [TEMPLATE_LOCK]);
    await ensureRoles(superuserUrl, {
      owner: rolePassword(superuserUrl, OWNER_ROLE),
      app: rolePassword(superuserUrl, APP_ROLE),
    });
    const present = await databasesLike(client, template.replaceAll('_', '\\_'));
    if (present.length === 0) await buildTemplate(client, superuserUrl, template);
  });
  return { superuserUrl, template };
}
