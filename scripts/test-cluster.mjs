import { randomBytes } from 'node:crypto';
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { waitForLock } from './lock.mjs';
import { testFolder } from './paths.mjs';
import { startCluster, stopCluster } from './postgres/cluster.mjs';
import {
  makeDataFolder,
  placeCluster,
  readPlacement,
  writePlacement,
} from './postgres/placement.mjs';
import { databaseUrl } from './postgres/psql.mjs';

/** @param {string} base */
function superuserPassword(base) {
  const file = join(base, 'superuser-password');
  if (!existsSync(file)) writeFileSync(file, randomBytes(18).toString('hex'), { mode: 0o600 });
  return readFileSync(file, 'utf8');
}

/**
 * Starts the throw-away cluster of a purpose: it never syncs to the disk, for speed, so nothing in it may matter.
 * @param {string} purpose `run` for npm test, `specs` for specs that a developer runs by hand
 * @returns {Promise<string>} the superuser's address
 */
export async function startTestCluster(purpose) {
  const base = join(testFolder(), purpose);
  makeDataFolder(base);
  const lock = await waitForLock(base, 'test-cluster');
  try {
    const { folder, port: preferredPort } = placeCluster(base);
    const password = superuserPassword(base);
    const options = { folder, preferredPort, password, durable: false, maxConnections: 300 };
    const { port } = await startCluster(options);
    writePlacement(base, { folder, port });
    return databaseUrl({ user: 'postgres', password, port, database: 'postgres' });
  } finally {
    await lock.release();
  }
}

/**
 * Stops the throw-away cluster of a purpose and removes it.
 * @param {string} purpose
 */
export async function removeTestCluster(purpose) {
  const base = join(testFolder(), purpose);
  const placement = readPlacement(base);
  if (placement) {
    await stopCluster(placement.folder);
    const inside = placement.folder.startsWith(base);
    rmSync(inside ? placement.folder : dirname(placement.folder), { recursive: true, force: true });
  }
  rmSync(base, { recursive: true, force: true });
}
