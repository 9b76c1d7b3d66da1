import { SetupFailure } from '../failure.mjs';
import { startCluster, stopCluster } from '../postgres/cluster.mjs';
import { placeCluster, writePlacement } from '../postgres/placement.mjs';
import { databaseUrl } from '../postgres/psql.mjs';
import {
  APP_ROLE,
  dropDatabase,
  ensureDatabase,
  ensureRoles,
  OWNER_ROLE,
} from '../postgres/roles.mjs';

const DATABASE = 'plimsoll';

/**
 * @typedef {object} DatabaseUrls
 * @property {string} app the role that the server signs in as
 * @property {string} owner the role that migrates
 */

/**
 * Starts the cluster in the data folder, with its two roles and the product's database.
 * @param {string} folder the data folder
 * @param {import('../setup/secrets.mjs').Secrets} secrets
 * @param {(outcome: string) => void} tell
 * @returns {Promise<DatabaseUrls>}
 */
export async function startOwnDatabase(folder, secrets, tell) {
  const placement = placeCluster(folder);
  const { port, created } = await startCluster({
    folder: placement.folder,
    preferredPort: placement.port,
    password: secrets['database-superuser'],
    durable: true,
  });
  writePlacement(folder, { ...placement, port });
  /** @param {string} user @param {string} password @param {string} database */
  const url = (user, password, database) => databaseUrl({ user, password, port, database });
  const superuserUrl = url('postgres', secrets['database-superuser'], 'postgres');
  await ensureRoles(superuserUrl, {
    owner: secrets['database-owner'],
    app: secrets['database-app'],
  });
  await ensureDatabase(superuserUrl, DATABASE);
  tell(`${created ? 'made' : 'started'} in ${placement.folder}, port ${port}`);
  return {
    app: url(APP_ROLE, secrets['database-app'], DATABASE),
    owner: url(OWNER_ROLE, secrets['database-owner'], DATABASE),
  };
}

/**
 * Drops the product's database and makes it again, empty.
 * @param {string} folder the data folder, whose cluster runs
 * @param {import('../setup/secrets.mjs').Secrets} secrets
 */
export async function resetOwnDatabase(folder, secrets) {
  const { port } = placeCluster(folder);
  const superuserUrl = databaseUrl({
    user: 'postgres',
    password: secrets['database-superuser'],
    port,
    database: 'postgres',
  });
  await dropDatabase(superuserUrl, DATABASE);
  await ensureDatabase(superuserUrl, DATABASE);
}

/**
 * Stops the cluster of a data folder; nothing happens when it does not run.
 * @param {string} folder the data folder
 */
export async function stopOwnDatabase(folder) {
  const placement = placeCluster(folder);
  await stopCluster(placement.folder);
}

/**
 * The addresses of an existing server, when DATABASE_URL names one. A demonstration may do with one role; then the
 * database's own triggers alone keep the audit.
 * @param {NodeJS.ProcessEnv} env
 * @param {boolean} demo
 * @returns {DatabaseUrls | null}
 */
export function givenDatabase(env, demo) {
  const app = env['DATABASE_URL'];
  const owner = env['DATABASE_OWNER_URL'];
  if (!app && !owner) return null;
  if (app && owner) return { app, owner };
  if (app && demo) return { app, owner: app };
  throw new SetupFailure({
    why: `${app ? 'DATABASE_OWNER_URL' : 'DATABASE_URL'} is not set: an existing server needs both, DATABASE_URL for the role that the server signs in as and DATABASE_OWNER_URL for the role that owns the tables.`,
  });
}
