import { statSync } from 'node:fs';
import { connect, createServer } from 'node:net';
import { setTimeout as sleep } from 'node:timers/promises';

/**
 * @typedef {object} Lock
 * @property {() => Promise<void>} release
 */

/**
 * An abstract socket: the kernel frees the name with its process, so that a kill leaves no stale lock behind.
 * @param {string} folder an existing folder
 * @param {string} purpose
 */
function lockName(folder, purpose) {
  const { dev, ino } = statSync(folder);
  return `\0plimsoll-${purpose}-${dev}-${ino}`;
}

/**
 * Takes the lock of a folder for one purpose, or answers null when another process has it.
 * @param {string} folder an existing folder
 * @param {string} purpose
 * @param {() => string} [about] what to tell those who ask who holds it
 * @returns {Promise<Lock | null>}
 */
export function tryLock(folder, purpose, about = () => String(process.pid)) {
  return new Promise((resolve, reject) => {
    const server = createServer((socket) => {
      socket.on('error', () => undefined);
      socket.end(about());
    });
    server.once('error', (/** @type {NodeJS.ErrnoException} */ error) =>
      error.code === 'EADDRINUSE' ? resolve(null) : reject(error),
    );
    server.listen({ path: lockName(folder, purpose) }, () => {
      server.unref();
      resolve({
        release: () => new Promise((closed) => server.close(() => closed(undefined))),
      });
    });
  });
}

/**
 * Waits for the lock of a folder.
 * @param {string} folder an existing folder
 * @param {string} purpose
 * @param {number} [patience] milliseconds
 * @returns {Promise<Lock>}
 */
export async function waitForLock(folder, purpose, patience = 120_000) {
  const end = Date.now() + patience;
  for (;;) {
    const lock = await tryLock(folder, purpose);
    if (lock) return lock;
    if (Date.now() > end)
      throw new Error(`Another process has held ${folder} (${purpose}) too long`);
    await sleep(50);
  }
}

/**
 * What the holder of a lock tells about itself; empty when it is gone.
 * @param {string} folder
 * @param {string} purpose
 * @returns {Promise<string>}
 */
export function askLockHolder(folder, purpose) {
  return new Promise((resolve) => {
    let answer = '';
    connect({ path: lockName(folder, purpose) })
      .setEncoding('utf8')
      .on('data', (text) => (answer += text))
      .on('error', () => resolve(''))
      .on('close', () => resolve(answer));
  });
}
