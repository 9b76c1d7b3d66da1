import { existsSync } from 'node:fs';
import { lastLines, runCommand } from '../command.mjs';
import { SetupFailure } from '../failure.mjs';

const environment = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
/** Another installation may be under way: wait for it rather than fail. */
const patience = ['-o', 'DPkg::Lock::Timeout=300'];

/** Whether this process may install Debian packages. */
export function canInstall() {
  return process.getuid?.() === 0 && existsSync('/usr/bin/apt-get');
}

/**
 * Installs Debian packages, as root.
 * @param {string[]} names
 */
export async function installDebianPackages(names) {
  const steps = [
    ['update', '-qq'],
    ['install', '-y', '-qq', '--no-install-recommends', ...names],
  ];
  for (const args of steps) {
    const result = await runCommand('apt-get', [...patience, ...args], { env: environment });
    if (result.code !== 0) {
      throw new SetupFailure({
        did: `Ran apt-get ${args.join(' ')}.`,
        why: lastLines(result.errors || result.output),
        type: `apt-get update && apt-get install ${names.join(' ')}`,
      });
    }
  }
}
