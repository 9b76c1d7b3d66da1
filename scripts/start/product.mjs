import { writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { lastLines, runCommand } from '../command.mjs';
import { SetupFailure } from '../failure.mjs';
import { askLockHolder, tryLock, waitForLock } from '../lock.mjs';
import { dataFolder, ROOT } from '../paths.mjs';
import { isPortFree } from '../ports.mjs';
import { makeDataFolder } from '../postgres/placement.mjs';
import { buildClient } from '../setup/build-client.mjs';
import { buildServer } from '../setup/build-server.mjs';
import { ensurePackages } from '../setup/packages.mjs';
import { ensurePostgres } from '../setup/postgres-programs.mjs';
import { ensureSecrets } from '../setup/secrets.mjs';
import { say, step } from '../steps.mjs';
import { startChild, waitUntilHealthy } from './child.mjs';
import { givenDatabase, startOwnDatabase, stopOwnDatabase } from './database.mjs';
import { migrate, refuseMixing } from './migration.mjs';
import { checkSettings } from './settings.mjs';
import { startStandIns } from './stand-ins.mjs';

/** @typedef {import('../../server/config').Config} Config */

/**
 * Work on what all copies in this checkout share; one start at a time does it.
 * @param {() => Promise<void>} work
 */
async function alone(work) {
  let lock = await tryLock(ROOT, 'setup');
  if (!lock) {
    say('Another start is preparing this checkout: waiting for it.');
    lock = await waitForLock(ROOT, 'setup', 900_000);
  }
  try {
    await work();
  } finally {
    await lock.release();
  }
}

/**
 * What the machine and the checkout need.
 * @param {NodeJS.ProcessEnv} env
 */
function prepareMachine(env) {
  return alone(async () => {
    if (!env['DATABASE_URL']) await step('PostgreSQL: find its programs', ensurePostgres);
    await step('Packages: compare with package-lock.json', ensurePackages);
    await step('Server: bundle', () => buildServer());
  });
}

/**
 * One start a data folder: a second one would stop the first one's database when it ends.
 * @param {string} folder
 */
async function claimDataFolder(folder) {
  makeDataFolder(folder);
  const port = process.env['PORT'] || '3000';
  const lock = await tryLock(folder, 'start', () => `process ${process.pid}, port ${port}`);
  if (lock) return lock;
  const holder = await askLockHolder(folder, 'start');
  throw new SetupFailure({
    why: `Plimsoll already runs on the data in ${folder} (${holder}): stop it first, or start another copy with a PLIMSOLL_DATA and a PORT of its own.`,
  });
}

/** @param {Config} config */
async function requireFreePort({ port, host }) {
  if (await isPortFree(port, host)) return;
  throw new SetupFailure({
    why: `Port ${port} is taken by another program: free it, or choose another port, for example PORT=${port + 10} npm start`,
  });
}

/**
 * @param {Config} config
 * @param {import('../setup/secrets.mjs').Secrets} secrets
 * @param {NodeJS.ProcessEnv} env
 * @param {import('../cleanup.mjs').Cleanup} cleanup
 */
async function openDatabase(config, secrets, env, cleanup) {
  const given = givenDatabase(env, config.demo);
  if (given) return given;
  cleanup.add(() => step('Database: stop', () => stopOwnDatabase(config.dataFolder)));
  return step('Database: start the own cluster', (tell) =>
    startOwnDatabase(config.dataFolder, secrets, tell),
  );
}

/**
 * Loads the demonstration, or plays it on to today.
 * @param {Config} config
 * @param {NodeJS.ProcessEnv} env
 * @param {(outcome: string) => void} tell
 */
async function loadDemo(config, env, tell) {
  writeFileSync(join(config.dataFolder, 'demo-data'), 'This folder holds demonstration data.\n');
  const loaded = await runCommand(process.execPath, ['dist/server/demo.js'], { cwd: ROOT, env });
  if (loaded.code === 0) return tell(lastLines(loaded.output, 1));
  throw new SetupFailure({
    did: 'Loaded the demonstration data.',
    why: lastLines(`${loaded.output}\n${loaded.errors}`),
    type: 'npm run db:reset, then npm start',
  });
}

/**
 * @param {Config} config
 * @param {NodeJS.ProcessEnv} env what the server is told
 */
export async function startServer(config, env) {
  const logFolder = join(config.dataFolder, 'logs');
  const server = startChild({ name: 'main', env, logFolder, show: say });
  const host = config.host === '0.0.0.0' ? '127.0.0.1' : config.host;
  try {
    await waitUntilHealthy(server, `http://${host}:${config.port}/api/health`);
    return server;
  } catch (error) {
    await server.stop();
    throw error;
  }
}

/**
 * Brings up everything but the server itself. What was started is left to `cleanup` to stop, also when a later step
 * fails.
 * @param {NodeJS.ProcessEnv} env
 * @param {import('../cleanup.mjs').Cleanup} cleanup
 * @param {{ buildsClient: boolean }} options
 */
export async function prepareProduct(env, cleanup, { buildsClient }) {
  await prepareMachine(env);
  const folder = dataFolder();
  const lock = await claimDataFolder(folder);
  cleanup.add(() => lock.release());
  const secrets = ensureSecrets(folder);
  const config = await step('Settings: check', () => checkSettings(env));
  await requireFreePort(config);
  if (buildsClient) await alone(() => step('Client: build', buildClient));

  const urls = await openDatabase(config, secrets, env, cleanup);
  await refuseMixing(urls.owner, config.demo);
  await step('Database: migrate', () => migrate(urls));

  /** @type {NodeJS.ProcessEnv} */
  const serverEnv = { ...env, NODE_ENV: 'production', DATABASE_URL: urls.app };
  delete serverEnv['DATABASE_OWNER_URL'];
  if (!config.demo) return { config, serverEnv, standIns: [] };

  await step('Demonstration: load, or play on to today', (tell) =>
    loadDemo(config, serverEnv, tell),
  );
  const webhookSecret = secrets['payment-webhook'];
  const standIns = await step('Stand-ins of hosted services: start', () =>
    startStandIns(env, { port: config.port, folder, webhookSecret, cleanup }),
  );
  for (const standIn of standIns) Object.assign(serverEnv, standIn.settings);
  return { config, serverEnv, standIns };
}

/**
 * Brings the whole product up.
 * @param {NodeJS.ProcessEnv} env
 * @param {import('../cleanup.mjs').Cleanup} cleanup
 */
export async function startProduct(env, cleanup) {
  const { config, serverEnv, standIns } = await prepareProduct(env, cleanup, {
    buildsClient: true,
  });
  const server = await step('Server: start', () => startServer(config, serverEnv));
  cleanup.add(() => step('Server: finish what is in hand', () => server.stop()));
  return { config, server, standIns };
}
