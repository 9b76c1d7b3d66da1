import { createHash } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { portFromPath } from '../ports.mjs';
import { canEnter, serverAccount } from './server-account.mjs';

/**
 * Where a cluster is and on which port it listens by preference.
 * @typedef {object} Placement
 * @property {string} folder
 * @property {number} port
 */

/** @param {string} base the folder that the cluster belongs to */
const noteFile = (base) => join(base, 'cluster.json');

/**
 * @param {string} base
 * @returns {Placement | null}
 */
export function readPlacement(base) {
  return existsSync(noteFile(base)) ? JSON.parse(readFileSync(noteFile(base), 'utf8')) : null;
}

/**
 * Keeps where the cluster is, for the next start and for whoever wonders.
 * @param {string} base
 * @param {Placement} placement
 */
export function writePlacement(base, placement) {
  writeFileSync(noteFile(base), `${JSON.stringify(placement, null, 2)}\n`, { mode: 0o600 });
}

/**
 * Makes a folder of data: closed to other users, but passable where another account runs the server.
 * @param {string} base an absolute path
 */
export function makeDataFolder(base) {
  if (existsSync(base)) return;
  mkdirSync(base, { recursive: true });
  chmodSync(base, serverAccount().uid === undefined ? 0o700 : 0o711);
}

/**
 * The cluster goes inside the given folder, or, where the server's account cannot enter that (a checkout in root's
 * home), to a folder of /var/lib that is named by it. What was chosen once stays.
 * @param {string} base an absolute path; made when missing
 * @returns {Placement}
 */
export function placeCluster(base) {
  const account = serverAccount();
  makeDataFolder(base);
  const known = readPlacement(base);
  if (known) return known;
  const hash = createHash('sha256').update(base).digest('hex').slice(0, 12);
  const folder = canEnter(account, base)
    ? join(base, 'postgres')
    : join(`/var/lib/plimsoll-${hash}`, 'postgres');
  return { folder, port: portFromPath(base) };
}
