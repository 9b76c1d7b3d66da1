import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { lastLines, runCommand } from '../command.mjs';
import { SetupFailure } from '../failure.mjs';
import { ROOT } from '../paths.mjs';

/**
 * @typedef {Record<string, { version?: string, optional?: boolean, link?: boolean }>} LockedPackages
 */

/**
 * What differs between the packages that the lock file asks for and those that npm last installed.
 * @param {LockedPackages} locked the `packages` of package-lock.json
 * @param {LockedPackages} installed the `packages` of node_modules/.package-lock.json, which npm writes last
 * @returns {string[]} paths; optional packages for other systems may be absent
 */
export function outdatedPackages(locked, installed) {
  const wanted = Object.entries(locked).filter(
    ([path, entry]) => path !== '' && installed[path]?.version !== entry.version,
  );
  return wanted
    .filter(([path, entry]) => installed[path] || !entry.optional)
    .map(([path]) => path)
    .concat(Object.keys(installed).filter((path) => !(path in locked)));
}

/** @param {string} file */
const readPackages = (file) => JSON.parse(readFileSync(file, 'utf8')).packages;

/** Whether node_modules is as package-lock.json says. */
function packagesAreIn() {
  const record = join(ROOT, 'node_modules', '.package-lock.json');
  if (!existsSync(record)) return false;
  return (
    outdatedPackages(readPackages(join(ROOT, 'package-lock.json')), readPackages(record)).length ===
    0
  );
}

/**
 * Installs the packages of the lock file, unless they are in already.
 * @param {(outcome: string) => void} tell
 */
export async function ensurePackages(tell) {
  if (packagesAreIn()) return tell('as package-lock.json says');
  const args = ['ci', '--ignore-scripts', '--no-audit', '--no-fund'];
  const npm = process.env['npm_execpath'];
  const [program, start] = npm?.endsWith('.js') ? [process.execPath, [npm]] : ['npm', []];
  const installed = await runCommand(program, [...start, ...args], { cwd: ROOT });
  if (installed.code === 0) return tell('installed');
  throw new SetupFailure({
    did: `Ran npm ${args.join(' ')} in ${ROOT}.`,
    why: lastLines(installed.errors || installed.output),
    type: `npm ci --ignore-scripts`,
  });
}
