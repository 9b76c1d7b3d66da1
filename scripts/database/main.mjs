import { existsSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { SetupFailure } from '../failure.mjs';
import { tryLock } from '../lock.mjs';
import { dataFolder } from '../paths.mjs';
import { makeDataFolder } from '../postgres/placement.mjs';
import { buildServer } from '../setup/build-server.mjs';
import { ensureSecrets } from '../setup/secrets.mjs';
import {
  givenDatabase,
  resetOwnDatabase,
  startOwnDatabase,
  stopOwnDatabase,
} from '../start/database.mjs';
import { migrate } from '../start/migration.mjs';
import { step } from '../steps.mjs';

/** What belongs to the demonstration beside its rows. */
const DEMO_FILES = ['demo-data', 'payment-service.json', 'mail'];

/**
 * Runs work on the own cluster, and leaves it as it was: running for a product that runs, else stopped.
 * @param {(urls: import('../start/database.mjs').DatabaseUrls) => Promise<void>} work
 */
async function onOwnDatabase(work) {
  const folder = dataFolder();
  makeDataFolder(folder);
  const lock = await tryLock(folder, 'start');
  try {
    const secrets = ensureSecrets(folder);
    const urls = await step('Database: start the own cluster', (tell) =>
      startOwnDatabase(folder, secrets, tell),
    );
    await work(urls);
  } finally {
    if (lock) await stopOwnDatabase(folder);
    await lock?.release();
  }
}

async function migrateDatabase() {
  await step('Server: bundle', () => buildServer());
  const given = givenDatabase(process.env, true);
  const work = (/** @type {import('../start/database.mjs').DatabaseUrls} */ urls) =>
    step('Database: migrate', () => migrate(urls));
  await (given ? work(given) : onOwnDatabase(work));
}

/** @param {string[]} flags */
async function resetDatabase(flags) {
  const folder = dataFolder();
  if (givenDatabase(process.env, true)) {
    throw new SetupFailure({
      why: 'DATABASE_URL names an existing server, which is never emptied from here: unset it to reset the own database.',
    });
  }
  if (!existsSync(join(folder, 'demo-data')) && !flags.includes('--yes')) {
    throw new SetupFailure({
      why: `This removes every record in ${folder} for good, and they are not demonstration data. To do it all the same, type: npm run db:reset -- --yes`,
    });
  }
  makeDataFolder(folder);
  const lock = await tryLock(folder, 'start');
  if (!lock) {
    throw new SetupFailure({ why: `Plimsoll runs on the data in ${folder}: stop it first.` });
  }
  await lock.release();
  await step('Server: bundle', () => buildServer());
  await onOwnDatabase(async (urls) => {
    await step('Database: drop and make again', () =>
      resetOwnDatabase(folder, ensureSecrets(folder)),
    );
    for (const file of DEMO_FILES) rmSync(join(folder, file), { recursive: true, force: true });
    await step('Database: migrate', () => migrate(urls));
  });
}

/**
 * `npm run db:migrate` and `npm run db:reset`.
 * @returns {Promise<number>} exit status
 */
export async function main() {
  const [action, ...flags] = process.argv.slice(2);
  if (action === 'migrate') await migrateDatabase();
  else if (action === 'reset') await resetDatabase(flags);
  else throw new SetupFailure({ why: 'Use: npm run db:migrate, or npm run db:reset' });
  return 0;
}
