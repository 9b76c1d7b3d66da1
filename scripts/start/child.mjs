import { spawn } from 'node:child_process';
import { createWriteStream, existsSync, mkdirSync, renameSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { createInterface } from 'node:readline';
import { setTimeout as sleep } from 'node:timers/promises';
import { SetupFailure } from '../failure.mjs';
import { ROOT } from '../paths.mjs';

/** How long a process may take to finish what it has in hand before it is killed. */
const PATIENCE_MS = 30_000;
const LAST_LINES = 20;

/**
 * A process of the product, running beside this one. It ends with this one, even when this one is killed: the channel
 * between the two closes, and each of them ends when that happens.
 * @typedef {object} Child
 * @property {string} name
 * @property {string} logFile
 * @property {Promise<number | null>} ended exit status
 * @property {() => string} lastLines what it printed last
 * @property {() => Promise<void>} stop
 */

/**
 * Keeps the former run's log beside the new one.
 * @param {string} file
 */
function openLog(file) {
  mkdirSync(dirname(file), { recursive: true, mode: 0o700 });
  if (existsSync(file)) renameSync(file, `${file}.1`);
  return createWriteStream(file, { mode: 0o600 });
}

/**
 * Starts a bundled entry point. Its JSON lines and its errors go to a log, lines for people, that is, not JSON, to `show`.
 * @param {object} options
 * @param {string} options.name of dist/server/NAME.js
 * @param {NodeJS.ProcessEnv} options.env
 * @param {string} options.logFolder
 * @param {(line: string) => void} [options.show]
 * @returns {Child}
 */
export function startChild({ name, env, logFolder, show = () => undefined }) {
  const logFile = join(logFolder, `${name}.log`);
  const log = openLog(logFile);
  const child = spawn(process.execPath, ['--enable-source-maps', `dist/server/${name}.js`], {
    cwd: ROOT,
    env,
    stdio: ['ignore', 'pipe', 'pipe', 'ipc'],
  });
  /** @type {string[]} */
  const recent = [];
  for (const stream of [child.stdout, child.stderr]) {
    if (!stream) continue;
    createInterface({ input: stream }).on('line', (line) => {
      const forPeople = line.trim() !== '' && !line.startsWith('{');
      if (forPeople) show(line);
      // What is for people alone may hold a link that must not be kept.
      if (!forPeople || stream === child.stderr) log.write(`${line}\n`);
      recent.push(line);
      if (recent.length > LAST_LINES) recent.shift();
    });
  }
  const ended = new Promise((resolve) => {
    child.once('error', () => resolve(null));
    child.once('close', (code) => resolve(code));
  });
  return {
    name,
    logFile,
    ended,
    lastLines: () => recent.join('\n'),
    async stop() {
      child.kill('SIGTERM');
      const patience = new AbortController();
      const killing = sleep(PATIENCE_MS, undefined, { signal: patience.signal })
        .then(() => child.kill('SIGKILL'))
        .catch(() => undefined);
      await ended;
      patience.abort();
      await killing;
    },
  };
}

/**
 * Waits until a process answers 200 at an address.
 * @param {Child} child
 * @param {string} url
 * @param {number} [patience] milliseconds
 */
export async function waitUntilHealthy(child, url, patience = 60_000) {
  const end = Date.now() + patience;
  let over = false;
  void child.ended.then(() => (over = true));
  while (!over && Date.now() < end) {
    const answer = await fetch(url).catch(() => null);
    if (answer?.ok) return;
    await sleep(50);
  }
  throw new SetupFailure({
    did: `Started dist/server/${child.name}.js and asked ${url} whether it is well.`,
    why: child.lastLines() || (over ? 'It ended at once.' : 'It gave no answer.'),
    type: `less ${child.logFile}`,
  });
}
