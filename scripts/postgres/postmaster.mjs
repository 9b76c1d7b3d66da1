import { existsSync, readFileSync, realpathSync, rmSync } from 'node:fs';
import { join } from 'node:path';

/** @param {string} folder the cluster's folder */
const pidFile = (folder) => join(folder, 'postmaster.pid');

/**
 * Whether a process is this cluster's server. A killed server may stay a zombie where process 1 reaps nothing, and
 * after a restart of the machine its number may be another program's: both would make pg_ctl say "running".
 * @param {number} pid
 * @param {string} folder
 */
function isServerOf(pid, folder) {
  try {
    const state = readFileSync(`/proc/${pid}/stat`, 'utf8').replace(/^.*\) /s, '');
    return !state.startsWith('Z') && realpathSync(`/proc/${pid}/cwd`) === realpathSync(folder);
  } catch {
    return false;
  }
}

/**
 * The running server of a cluster, or null; a pid file that lies is removed.
 * @param {string} folder the cluster's folder
 * @returns {{ pid: number, port: number } | null}
 */
export function runningServer(folder) {
  if (!existsSync(pidFile(folder))) return null;
  // Line 1 is the process, line 4 the port (PostgreSQL, src/include/utils/pidfile.h).
  const [pid, , , port] = readFileSync(pidFile(folder), 'utf8').split('\n').map(Number);
  if (pid && port && isServerOf(pid, folder)) return { pid, port };
  rmSync(pidFile(folder), { force: true });
  return null;
}
