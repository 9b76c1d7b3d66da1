import { hashPassword } from '../accounts/password-hash';
import { ConfigError, loadConfig } from '../config';
import { openDatabase } from '../database/client';
import { playDemo } from './play';
import type { PlayOutcome } from './play';

const told: Record<PlayOutcome, string> = {
  loaded: 'The demonstration is loaded.',
  'played on': 'The demonstration is played on to now.',
  'up to date': 'The demonstration stands at now already.',
  'another version':
    'The demonstration was loaded by another version of Plimsoll and stays as it is; to make it anew, type: npm run db:reset',
};

/** The first load is one long transaction. */
const statementTimeoutMs = 120_000;

async function main(): Promise<void> {
  const config = loadConfig(process.env);
  if (!config.demo)
    throw new ConfigError(['PLIMSOLL_DEMO: is off, so no demonstration is loaded.']);
  const database = openDatabase(config.databaseUrl, { max: 1, statementTimeoutMs });
  try {
    console.log(told[await playDemo(database, new Date(), hashPassword)]);
  } finally {
    await database.$client.end();
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof ConfigError ? error.message : error);
  process.exit(1);
});
