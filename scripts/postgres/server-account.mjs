import { spawnSync } from 'node:child_process';
import { readFileSync } from 'node:fs';
import { SetupFailure } from '../failure.mjs';

const ACCOUNT = 'postgres';

/**
 * Who runs the database server: PostgreSQL refuses to run as root.
 * @typedef {object} ServerAccount
 * @property {string} name
 * @property {number} [uid] unset when the caller runs the server as itself
 * @property {number} [gid]
 */

/** @param {string} name */
function lookUp(name) {
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith(`${name}:`));
  if (!line) return null;
  const [, , uid, gid] = line.split(':');
  return { name, uid: Number(uid), gid: Number(gid) };
}

/**
 * The account that runs the server; made when the caller is root and there is none yet.
 * @returns {ServerAccount}
 */
export function serverAccount() {
  if (process.getuid?.() !== 0) return { name: process.env['USER'] ?? 'you' };
  const known = lookUp(ACCOUNT);
  if (known) return known;
  const made = spawnSync(
    'useradd',
    ['--system', '--user-group', '--no-create-home', '--shell', '/usr/sbin/nologin', ACCOUNT],
    { encoding: 'utf8' },
  );
  const account = lookUp(ACCOUNT);
  if (account) return account;
  throw new SetupFailure({
    did: `Made the system account "${ACCOUNT}" that runs the database server.`,
    why: made.stderr || made.error?.message || 'useradd made no account.',
    type: `useradd --system --user-group ${ACCOUNT}`,
  });
}

/**
 * Spawn options that run a program as the server's account, from a folder which it can enter.
 * @param {ServerAccount} account
 */
export function asAccount({ uid, gid }) {
  return { cwd: '/', ...(uid === undefined ? {} : { uid, gid }) };
}

/**
 * Whether the server's account can enter a folder, that is, each folder above it too.
 * @param {ServerAccount} account
 * @param {string} folder
 */
export function canEnter(account, folder) {
  return spawnSync('/bin/sh', ['-c', 'cd "$1"', 'sh', folder], asAccount(account)).status === 0;
}
