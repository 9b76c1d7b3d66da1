import { createHash } from 'node:crypto';
import { createServer } from 'node:net';

const LOOPBACK = '127.0.0.1';

/**
 * Whether nothing listens on this port of the loopback address.
 * @param {number} port 1–65535
 * @param {string} [host]
 * @returns {Promise<boolean>}
 */
export function isPortFree(port, host = LOOPBACK) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen({ port, host, exclusive: true }, () => probe.close(() => resolve(true)));
  });
}

/**
 * The preferred port when it is free, else the next free one above it.
 * @param {number} preferred 1–65535
 * @param {ReadonlySet<number>} [taken] ports promised to others
 * @returns {Promise<number>}
 */
export async function findFreePort(preferred, taken = new Set()) {
  for (let port = preferred; port < preferred + 500 && port <= 65535; port += 1) {
    if (!taken.has(port) && (await isPortFree(port))) return port;
  }
  throw new Error(`No free port between ${preferred} and ${preferred + 499}`);
}

/**
 * A port of its own for each folder, so that two checkouts on one machine do not meet: 20000–31999,
 * below the range from which Linux takes the ports of outgoing connections.
 * @param {string} folder absolute path
 */
export function portFromPath(folder) {
  return 20000 + (createHash('sha256').update(folder).digest().readUInt32BE(0) % 12000);
}
