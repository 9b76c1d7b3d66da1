import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { mkdirSync, rmSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { findFreePort, portFromPath } from './ports.mjs';
import { placeCluster } from './postgres/placement.mjs';
import { databaseUrl } from './postgres/psql.mjs';
import { APP_ROLE } from './postgres/roles.mjs';
import { ensureSecrets, type Secrets } from './setup/secrets.mjs';

const root = fileURLToPath(new URL('..', import.meta.url));

export interface Product {
  readonly url: string;
  /** Where the stand-in shows the e-mail that it caught. */
  readonly mailUrl: string;
  /** As the server signs in. */
  readonly databaseUrl: string;
  readonly superuserUrl: string;
  readonly secrets: Secrets;
  readonly stop: () => Promise<void>;
}

/** What `npm start` printed until it was ready. */
function whenReady(child: ChildProcess): Promise<string> {
  return new Promise((resolve, reject) => {
    let output = '';
    const hear = (chunk: Buffer): void => {
      output += chunk.toString();
      if (/Plimsoll is ready at[\s\S]*Stop with Ctrl-C/.test(output)) resolve(output);
    };
    child.stdout?.on('data', hear);
    child.stderr?.on('data', hear);
    child.once('exit', (code) => reject(new Error(`The product ended with ${code}:\n${output}`)));
  });
}

function addressIn(output: string, before: RegExp): string {
  const found = new RegExp(`${before.source}\\s*(http://127\\.0\\.0\\.1:\\d+)`).exec(output)?.[1];
  if (!found) throw new Error(`No address after ${before.source} in:\n${output}`);
  return found;
}

/**
 * The product with its demonstration, started as a new user would, from nothing, on a database of its own.
 * @param purpose names its folder beside those of the tests
 */
export async function startProduct(purpose: string): Promise<Product> {
  const folder = `${root}.plimsoll-test/${purpose}`;
  rmSync(folder, { recursive: true, force: true });
  mkdirSync(folder, { recursive: true });
  const port = await findFreePort(portFromPath(`${folder}/web`));
  const { DATABASE_URL: _, ...env } = process.env;
  const child = spawn(process.execPath, ['scripts/start.mjs'], {
    cwd: root,
    env: { ...env, PORT: String(port), PLIMSOLL_DATA: folder, LOG_LEVEL: 'warn' },
    stdio: ['ignore', 'pipe', 'pipe'],
  });
  const output = await whenReady(child);
  const secrets = ensureSecrets(folder);
  const as = (user: string, password: string) =>
    databaseUrl({ user, password, port: placeCluster(folder).port, database: 'plimsoll' });
  return {
    url: addressIn(output, /ready at/),
    mailUrl: addressIn(output, /E-mail \(stand-in[^)]*\):/),
    databaseUrl: as(APP_ROLE, secrets['database-app']),
    superuserUrl: as('postgres', secrets['database-superuser']),
    secrets,
    stop: async () => {
      const ended = once(child, 'exit');
      child.kill('SIGTERM');
      await ended;
    },
  };
}
