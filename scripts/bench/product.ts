import { spawn } from 'node:child_process';
import { once } from 'node:events';
import { rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { findFreePort } from '../ports.mjs';
import { placeCluster } from '../postgres/placement.mjs';
import { databaseUrl } from '../postgres/psql.mjs';
import { APP_ROLE, OWNER_ROLE } from '../postgres/roles.mjs';
import { ensureSecrets, type Secrets } from '../setup/secrets.mjs';

const root = fileURLToPath(new URL('../..', import.meta.url));
const folder = fileURLToPath(new URL('../../.plimsoll-test/bench', import.meta.url));

export interface Product {
  readonly url: string;
  /** As the server signs in. */
  readonly databaseUrl: string;
  /** As the migrations sign in. */
  readonly ownerUrl: string;
  readonly secrets: Secrets;
  readonly stop: () => Promise<void>;
}

/** The product with its demonstration, started from nothing on a durable database of its own. */
export async function startProduct(): Promise<Product> {
  rmSync(folder, { recursive: true, force: true });
  const port = await findFreePort(34_000);
  const { DATABASE_URL: _, ...env } = process.env;
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: root,
    env: { ...env, PORT: String(port), PLIMSOLL_DATA: folder, LOG_LEVEL: 'warn' },
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  const ready = new Promise<void>((resolve, reject) => {
    child.stdout.on('data', (text: Buffer) => {
      if (text.toString().includes('Stop with Ctrl-C')) resolve();
    });
    child.once('exit', (code) => reject(new Error(`The product ended with ${code}`)));
  });
  await ready;
  const secrets = ensureSecrets(folder);
  const { port: databasePort } = placeCluster(folder);
  const as = (user: string, password: string) =>
    databaseUrl({ user, password, port: databasePort, database: 'plimsoll' });
  return {
    url: `http://127.0.0.1:${port}`,
    databaseUrl: as(APP_ROLE, secrets['database-app']),
    ownerUrl: as(OWNER_ROLE, secrets['database-owner']),
    secrets,
    stop: async () => {
      child.kill('SIGTERM');
      await once(child, 'exit');
    },
  };
}
