import { randomBytes } from 'node:crypto';
import { chmodSync, existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const NAMES = /** @type {const} */ ([
  'session',
  'csrf',
  'database-superuser',
  'database-owner',
  'database-app',
  'payment-webhook',
]);

/** @typedef {Record<typeof NAMES[number], string>} Secrets */

/**
 * Makes the secrets that are missing, 256 random bits each, readable by their owner alone, and reads them all.
 * @param {string} folder the data folder
 * @returns {Secrets}
 */
export function ensureSecrets(folder) {
  const place = join(folder, 'secrets');
  mkdirSync(place, { recursive: true, mode: 0o700 });
  chmodSync(place, 0o700);
  const entries = NAMES.map((name) => {
    const file = join(place, name);
    if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 });
    chmodSync(file, 0o600);
    return [name, readFileSync(file, 'utf8')];
  });
  return Object.fromEntries(entries);
}
