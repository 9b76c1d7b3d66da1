import { mkdir, writeFile } from 'node:fs/promises';
import { dirname, join } from 'node:path';
import { hashPassword } from '../accounts/password-hash';
import { ConfigError, loadConfig } from '../config';
import { openDatabase } from '../database/client';
import { playDemo } from './play';
import { storyPayments, type StoryPayment } from './story-payments';
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

/** The stand-in of the payment service reads it at its start, so that a payment of the story can be given back. */
async function keepForStandIn(path: string, payments: readonly StoryPayment[]): Promise<void> {
  await mkdir(dirname(path), { recursive: true });
  await writeFile(path, JSON.stringify(payments), { mode: 0o600 });
}

async function main(): Promise<void> {
  const config = loadConfig(process.env);
  if (!config.demo)
    throw new ConfigError(['PLIMSOLL_DEMO: is off, so no demonstration is loaded.']);
  const database = openDatabase(config.databaseUrl, { max: 1, statementTimeoutMs });
  try {
    const outcome = await playDemo(database, new Date(), hashPassword);
    await keepForStandIn(
      join(config.dataFolder, 'demo-payments.json'),
      await storyPayments(database),
    );
    console.log(told[outcome]);
  } finally {
    await database.$client.end();
  }
}

main().catch((error: unknown) => {
  console.error(error instanceof ConfigError ? error.message : error);
  process.exit(1);
});
