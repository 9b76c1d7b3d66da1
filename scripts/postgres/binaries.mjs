import { existsSync, readdirSync, realpathSync } from 'node:fs';
import { delimiter, dirname, join } from 'node:path';

const DEBIAN_FOLDER = '/usr/lib/postgresql';
const NEEDED = ['postgres', 'initdb', 'pg_ctl', 'psql'];

/**
 * @typedef {object} PostgresBinaries
 * @property {string} folder where postgres, initdb, pg_ctl and psql are
 * @property {number} major the major version
 */

/** @param {string} folder */
const isComplete = (folder) => NEEDED.every((name) => existsSync(join(folder, name)));

/** Debian's places, newest first. */
function debianFolders() {
  if (!existsSync(DEBIAN_FOLDER)) return [];
  return readdirSync(DEBIAN_FOLDER)
    .filter((name) => /^\d+$/.test(name))
    .sort((a, b) => Number(b) - Number(a))
    .map((name) => join(DEBIAN_FOLDER, name, 'bin'));
}

/** Folders in PATH; links are followed, since a lone link to `postgres` has no psql beside it. */
function pathFolders() {
  return (process.env['PATH'] ?? '')
    .split(delimiter)
    .map((folder) => join(folder, 'postgres'))
    .filter((file) => existsSync(file))
    .map((file) => dirname(realpathSync(file)));
}

/** @param {string} folder */
function majorOf(folder) {
  const match = /\/(\d+)\/bin$/.exec(folder);
  return match ? Number(match[1]) : null;
}

/**
 * The server programs of PostgreSQL 15 or later, newest first unless a version is asked for.
 * @param {number} [wanted] the major version that an existing cluster was made by
 * @returns {PostgresBinaries | null}
 */
export function findPostgres(wanted) {
  for (const folder of [...debianFolders(), ...pathFolders()]) {
    const major = majorOf(folder);
    if (!isComplete(folder) || major === null || major < 15) continue;
    if (wanted === undefined || wanted === major) return { folder, major };
  }
  return null;
}
