import { join } from 'node:path';
import { pathToFileURL } from 'node:url';
import { SetupFailure } from '../failure.mjs';
import { ROOT } from '../paths.mjs';

/** One of the demonstration's accounts, by which its data are known. */
const DEMO_EMAIL = 'physiologist@harborlane.example';

/**
 * @param {unknown} error
 * @returns {string} the reasons, the inner ones too: Drizzle and Node wrap them
 */
function reasonsOf(error) {
  if (error instanceof AggregateError) return error.errors.map(reasonsOf).join('\n');
  if (!(error instanceof Error)) return String(error);
  return error.cause ? `${error.message}\n${reasonsOf(error.cause)}` : error.message;
}

/**
 * @param {string} url
 * @param {unknown} error
 */
function unreachable(url, error) {
  const { host, pathname, username } = new URL(url);
  return new SetupFailure({
    did: `Connected to ${pathname.slice(1)} at ${host} as ${username}.`,
    why: reasonsOf(error),
    type: 'npm start again, once the server answers and DATABASE_URL is right',
  });
}

/**
 * Brings the database to the newest schema.
 * @param {import('./database.mjs').DatabaseUrls} urls
 */
export async function migrate({ app, owner }) {
  const { migrateDatabase } = await import(
    pathToFileURL(join(ROOT, 'dist/server/migrate.js')).href
  );
  try {
    await migrateDatabase(owner, { appRole: decodeURIComponent(new URL(app).username) });
  } catch (error) {
    const { host, pathname } = new URL(owner);
    throw new SetupFailure({
      did: `Applied the migrations to ${pathname.slice(1)} at ${host}.`,
      why: reasonsOf(error),
      type: 'npm run db:migrate',
    });
  }
}

/**
 * Refuses to mix a real program with the demonstration, whichever server holds it, before anything is changed.
 * @param {string} ownerUrl
 * @param {boolean} demo
 */
export async function refuseMixing(ownerUrl, demo) {
  const { default: pg } = await import('pg');
  const client = new pg.Client({ connectionString: ownerUrl });
  await client.connect().catch((error) => {
    throw unreachable(ownerUrl, error);
  });
  try {
    const { rows: tables } = await client.query("SELECT to_regclass('public.users') AS users");
    if (tables[0].users === null) return;
    const { rows } = await client.query(
      'SELECT count(*)::int AS users, count(*) FILTER (WHERE email = $1)::int AS demo FROM users',
      [DEMO_EMAIL],
    );
    if (demo && rows[0].users > 0 && rows[0].demo === 0) {
      throw new SetupFailure({
        why: 'This database holds a real program, into which no demonstration data may go: set PLIMSOLL_DEMO=off to start it, or name another database or PLIMSOLL_DATA.',
      });
    }
    if (!demo && rows[0].demo > 0) {
      throw new SetupFailure({
        why: 'This database holds demonstration data, whose passwords everyone knows: name an empty database, or another PLIMSOLL_DATA, for a real program.',
      });
    }
  } finally {
    await client.end();
  }
}
