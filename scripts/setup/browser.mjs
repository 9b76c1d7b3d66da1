import { existsSync } from 'node:fs';
import { SetupFailure } from '../failure.mjs';
import { canInstall, installDebianPackages } from './apt.mjs';

/** Where Debian's package puts it. */
export const CHROMIUM = '/usr/bin/chromium';

/**
 * Finds Chromium, or installs it when root.
 * @param {(outcome: string) => void} tell
 */
export async function ensureBrowser(tell) {
  if (existsSync(CHROMIUM)) return tell(CHROMIUM);
  if (!canInstall()) {
    throw new SetupFailure({
      why: 'Chromium, which the tests drive, is not on this machine, and only an administrator can install it: type `sudo apt-get install chromium`, then start again.',
    });
  }
  await installDebianPackages(['chromium']);
  tell('Chromium installed');
}
