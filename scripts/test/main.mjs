import { mkdirSync } from 'node:fs';
import { Cleanup, stopRequest } from '../cleanup.mjs';
import { SetupFailure } from '../failure.mjs';
import { tryLock } from '../lock.mjs';
import { ROOT, testFolder } from '../paths.mjs';
import { ensureBrowser } from '../setup/browser.mjs';
import { buildClient } from '../setup/build-client.mjs';
import { buildServer } from '../setup/build-server.mjs';
import { ensurePackages } from '../setup/packages.mjs';
import { ensurePostgres } from '../setup/postgres-programs.mjs';
import { step } from '../steps.mjs';
import { removeTestCluster, startTestCluster } from '../test-cluster.mjs';
import { runBuild, runCheck } from './run-check.mjs';
import { runSuite } from './run-suite.mjs';
import { CHECKS, choose, SUITES } from './suites.mjs';
import { addTotals, summary } from './totals.mjs';

/** @typedef {import('./run-check.mjs').Outcome} Outcome */
/** @typedef {() => Promise<Outcome>} Task */

/** Settings of a product that runs beside must not reach the tests. */
function testEnvironment() {
  const foreign = /^(PLIMSOLL_|DATABASE_|STRIPE_|SMTP_|PORT$|TEST_DATABASE_URL$|NODE_ENV$|VITEST)/;
  const kept = Object.entries(process.env).filter(([name]) => !foreign.test(name));
  return { ...Object.fromEntries(kept), NG_CLI_ANALYTICS: 'false', NO_COLOR: '1' };
}

/** @param {Outcome} outcome */
function tell({ name, totals, output, seconds }) {
  const counts = totals.failed > 0 ? summary(totals) : `${totals.passed} passed`;
  console.log(`${totals.failed > 0 ? '✗' : '✓'} ${name}: ${counts} (${seconds.toFixed(1)} s)`);
  if (totals.failed > 0) console.log(`${output.trim()}\n`);
}

/**
 * Runs tasks, so many at a time, and tells each outcome as it comes; begins none while everything is being stopped.
 * @param {Task[]} tasks
 * @param {number} atOnce
 * @param {Cleanup} cleanup
 */
async function runAll(tasks, atOnce, cleanup) {
  /** @type {Outcome[]} */
  const outcomes = [];
  const waiting = [...tasks];
  const work = async () => {
    for (let task = waiting.shift(); task && !cleanup.begun; task = waiting.shift()) {
      const outcome = await task();
      if (!cleanup.begun) tell(outcome);
      outcomes.push(outcome);
    }
  };
  await Promise.all(Array.from({ length: atOnce }, work));
  return outcomes;
}

/** @param {Cleanup} cleanup */
async function claimCheckout(cleanup) {
  mkdirSync(testFolder(), { recursive: true });
  const lock = await tryLock(ROOT, 'test');
  if (!lock)
    throw new SetupFailure({ why: 'npm test already runs in this checkout: wait for it.' });
  cleanup.add(() => lock.release());
}

/**
 * @param {Cleanup} cleanup
 * @returns {Promise<string>} the superuser's address
 */
function startDatabase(cleanup) {
  cleanup.add(() => removeTestCluster('run'));
  return step('Database: start a throw-away cluster', async () => {
    await removeTestCluster('run');
    return startTestCluster('run');
  });
}

/** The builds that are asked for, or that a browser's suite needs. @param {string[]} asked @param {boolean} needed */
function chosenBuilds(asked, needed) {
  const builds = [
    { name: 'build-client', build: () => buildClient(() => undefined) },
    { name: 'build-server', build: buildServer },
  ];
  return needed ? builds : choose(builds, asked);
}

/**
 * @param {string[]} asked beginnings of names; none means everything
 * @param {Cleanup} cleanup
 */
async function runTests(asked, cleanup) {
  const suites = choose(SUITES, asked);
  const checks = choose(CHECKS, asked);
  const browser = suites.some((suite) => suite.browser);
  const builds = chosenBuilds(asked, browser);
  if (suites.length + checks.length + builds.length === 0) {
    const names = [...CHECKS, ...SUITES].map(({ name }) => name).join(', ');
    throw new SetupFailure({ why: `No test is named ${asked.join(' ')}; there are ${names}.` });
  }
  await claimCheckout(cleanup);
  const database = suites.some((suite) => suite.database);
  if (database) await step('PostgreSQL: find its programs', ensurePostgres);
  if (browser) await step('Chromium: find it', ensureBrowser);
  await step('Packages: compare with package-lock.json', ensurePackages);

  /** @type {NodeJS.ProcessEnv} */
  const env = testEnvironment();
  if (database) env['TEST_DATABASE_URL'] = await startDatabase(cleanup);
  const outcomes = await runAll(
    [
      ...builds.map(
        ({ name, build }) =>
          () =>
            runBuild(name, build),
      ),
      ...checks.map((check) => () => runCheck(check, env)),
    ],
    2,
    cleanup,
  );
  const suiteTasks = suites.map((suite) => () => runSuite(suite, env));
  outcomes.push(...(await runAll(suiteTasks, 1, cleanup)));
  return addTotals(outcomes.map(({ totals }) => totals));
}

/**
 * `npm test`: sets up what is missing, runs everything and ends with the true totals.
 * @returns {Promise<number>} exit status
 */
export async function main() {
  const cleanup = new Cleanup();
  try {
    const ended = await Promise.race([runTests(process.argv.slice(2), cleanup), stopRequest()]);
    await cleanup.run();
    if (typeof ended === 'string') return 130;
    console.log(summary(ended));
    return ended.failed > 0 ? 1 : 0;
  } finally {
    await cleanup.run();
  }
}
