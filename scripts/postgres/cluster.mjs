import {
  appendFileSync,
  chmodSync,
  chownSync,
  existsSync,
  mkdirSync,
  mkdtempSync,
  readFileSync,
  renameSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { dirname, join } from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { lastLines, runCommand } from '../command.mjs';
import { SetupFailure } from '../failure.mjs';
import { waitForLock } from '../lock.mjs';
import { findFreePort } from '../ports.mjs';
import { findPostgres } from './binaries.mjs';
import { runningServer } from './postmaster.mjs';
import { asAccount, serverAccount } from './server-account.mjs';

const SETTINGS = 'plimsoll.conf';
/** A killed server's children need a moment before its memory is free again. */
const START_ATTEMPTS = 20;

/**
 * @typedef {object} ClusterOptions
 * @property {string} folder where the cluster's files are; absolute
 * @property {number} preferredPort
 * @property {string} password of the superuser `postgres`
 * @property {boolean} durable false only for clusters whose data may be lost (tests)
 * @property {number} [maxConnections]
 */

/** @param {string} folder */
function versionOf(folder) {
  const file = join(folder, 'PG_VERSION');
  return existsSync(file) ? Number(readFileSync(file, 'utf8')) : undefined;
}

/** @param {string} folder */
function binariesFor(folder) {
  const wanted = versionOf(folder);
  const binaries = findPostgres(wanted);
  if (binaries) return binaries.folder;
  throw new SetupFailure({
    did: 'Looked for the programs of PostgreSQL.',
    why: wanted
      ? `The data in ${folder} were made by PostgreSQL ${wanted}, which is not on this machine.`
      : 'PostgreSQL 15 or later is not on this machine.',
    type: `sudo apt-get install postgresql${wanted ? `-${wanted}` : ''}`,
  });
}

/**
 * Makes a cluster beside its place and moves it there when it is whole: a broken initdb never looks like a cluster.
 * @param {ClusterOptions} options
 * @param {string} bin
 */
async function createCluster({ folder, password }, bin) {
  const account = serverAccount();
  const workshop = mkdtempSync(`${folder}.new-`);
  const passwordFile = join(workshop, 'password');
  const data = join(workshop, 'data');
  try {
    writeFileSync(passwordFile, `${password}\n`, { mode: 0o600 });
    if (account.uid !== undefined && account.gid !== undefined) {
      chownSync(passwordFile, account.uid, account.gid);
      chownSync(workshop, account.uid, account.gid);
    }
    const made = await runCommand(
      join(bin, 'initdb'),
      ['-D', data, '-U', 'postgres', '--auth=scram-sha-256', `--pwfile=${passwordFile}`].concat([
        '--encoding=UTF8',
        '--locale=C.UTF-8',
        '--data-checksums',
      ]),
      asAccount(account),
    );
    if (made.code !== 0) {
      throw new SetupFailure({
        did: `Made a database cluster in ${folder}.`,
        why: lastLines(made.errors || made.output),
        type: `rm -rf ${folder} (it holds no data yet), then start again`,
      });
    }
    appendFileSync(join(data, 'postgresql.conf'), `\ninclude_if_exists = '${SETTINGS}'\n`);
    rmSync(folder, { recursive: true, force: true });
    renameSync(data, folder);
  } finally {
    rmSync(workshop, { recursive: true, force: true });
  }
}

/**
 * @param {ClusterOptions} options
 * @param {number} port
 */
function writeSettings({ folder, durable, maxConnections = 100 }, port) {
  const onOff = durable ? 'on' : 'off';
  const settings = {
    port,
    listen_addresses: "'127.0.0.1'",
    unix_socket_directories: "''",
    password_encryption: "'scram-sha-256'",
    max_connections: maxConnections,
    timezone: "'UTC'",
    log_timezone: "'UTC'",
    fsync: onOff,
    synchronous_commit: onOff,
    full_page_writes: onOff,
  };
  const file = join(folder, SETTINGS);
  const lines = Object.entries(settings).map(([name, value]) => `${name} = ${value}`);
  writeFileSync(file, `# Written at each start.\n${lines.join('\n')}\n`);
  chmodSync(file, 0o644);
}

/**
 * @param {ClusterOptions} options
 * @param {string} bin
 * @returns {Promise<number>} the port
 */
async function launch(options, bin) {
  const { folder } = options;
  const log = join(folder, 'server.log');
  let port = options.preferredPort;
  for (let attempt = 1; ; attempt += 1) {
    port = await findFreePort(port);
    writeSettings(options, port);
    rmSync(log, { force: true });
    const args = ['start', '-D', folder, '-l', log, '-w', '-t', '60', '-s'];
    const started = await runCommand(join(bin, 'pg_ctl'), args, asAccount(serverAccount()));
    if (started.code === 0) return port;
    const why = lastLines(existsSync(log) ? readFileSync(log, 'utf8') : started.errors);
    const passing = /shared memory block|could not bind|Address already in use/.test(why);
    if (!passing || attempt === START_ATTEMPTS) {
      throw new SetupFailure({
        did: `Started the database server on the data in ${folder}.`,
        why,
        type: `less ${log}`,
      });
    }
    await sleep(500);
  }
}

/**
 * Starts a cluster, and makes it first when there is none; one that already runs is taken over as it is.
 * Listens on 127.0.0.1 alone, with passwords (SCRAM) and without a unix socket.
 * @param {ClusterOptions} options
 * @returns {Promise<{ port: number, created: boolean }>}
 */
export async function startCluster(options) {
  mkdirSync(dirname(options.folder), { recursive: true });
  const lock = await waitForLock(dirname(options.folder), 'cluster');
  try {
    const bin = binariesFor(options.folder);
    const created = versionOf(options.folder) === undefined;
    if (created) await createCluster(options, bin);
    const running = runningServer(options.folder);
    return { port: running ? running.port : await launch(options, bin), created };
  } finally {
    await lock.release();
  }
}

/**
 * Stops a cluster cleanly; one that does not run is left alone.
 * @param {string} folder
 */
export async function stopCluster(folder) {
  if (versionOf(folder) === undefined || !runningServer(folder)) return;
  const args = ['stop', '-D', folder, '-m', 'fast', '-w', '-t', '60', '-s'];
  const stopped = await runCommand(
    join(binariesFor(folder), 'pg_ctl'),
    args,
    asAccount(serverAccount()),
  );
  if (stopped.code === 0 || !runningServer(folder)) return;
  throw new SetupFailure({
    did: `Stopped the database server on the data in ${folder}.`,
    why: lastLines(stopped.errors),
    type: `less ${join(folder, 'server.log')}`,
  });
}
