import { mkdirSync, writeFileSync } from 'node:fs';
import { SetupFailure } from '../failure.mjs';
import { findPostgres } from '../postgres/binaries.mjs';
import { canInstall, installDebianPackages } from './apt.mjs';

const CREATE_CLUSTER = '/etc/postgresql-common/createcluster.d';

/** Keeps Debian from making, and so from starting, a system-wide cluster on port 5432. */
function declineSystemCluster() {
  mkdirSync(CREATE_CLUSTER, { recursive: true });
  writeFileSync(`${CREATE_CLUSTER}/90-no-main.conf`, 'create_main_cluster = false\n');
}

/**
 * Finds the programs of PostgreSQL, or installs them when root.
 * @param {(outcome: string) => void} tell
 */
export async function ensurePostgres(tell) {
  const found = findPostgres();
  if (found) return tell(`PostgreSQL ${found.major} in ${found.folder}`);
  if (!canInstall()) {
    throw new SetupFailure({
      why: 'PostgreSQL 15 or later is not on this machine, and only an administrator can install it: type `sudo apt-get install postgresql`, then start again.',
    });
  }
  declineSystemCluster();
  await installDebianPackages(['postgresql']);
  const installed = findPostgres();
  if (installed) {
    return tell(`PostgreSQL ${installed.major} installed; no system cluster was made or started`);
  }
  throw new SetupFailure({
    did: 'Installed the Debian package postgresql.',
    why: 'It brought no PostgreSQL 15 or later to /usr/lib/postgresql.',
    type: 'apt-cache policy postgresql',
  });
}
