import { existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { lastLines, runCommand } from '../command.mjs';
import { packageProgram, ROOT, testFolder } from '../paths.mjs';
import { vitestTotals } from './totals.mjs';

const TIMEOUT_MS = 1_200_000;
const SHOWN_LINES = 400;

/**
 * @param {import('./suites.mjs').Suite} suite
 * @param {string} report where the totals are written
 * @returns {[program: string, args: string[]]}
 */
function commandOf({ runner, project }, report) {
  if (runner === 'angular') {
    // Angular's builder gives the file to the first reporter alone.
    const reporters = ['--reporters=json', '--reporters=default'];
    return [
      'ng',
      ['test', '--watch=false', '--progress=false', ...reporters, `--output-file=${report}`],
    ];
  }
  const reporters = ['--reporter=default', '--reporter=json', `--outputFile.json=${report}`];
  return ['vitest', ['run', '--project', project ?? '', ...reporters]];
}

/**
 * Runs one suite to its end and reads the runner's own totals.
 * @param {import('./suites.mjs').Suite} suite
 * @param {NodeJS.ProcessEnv} env
 * @returns {Promise<import('./run-check.mjs').Outcome>}
 */
export async function runSuite(suite, env) {
  const began = performance.now();
  const folder = join(testFolder(), 'reports');
  mkdirSync(folder, { recursive: true });
  const report = join(folder, `${suite.name}.json`);
  rmSync(report, { force: true });
  const zone = suite.zone ?? 'UTC';
  const [program, args] = commandOf(suite, report);
  const { code, output, errors } = await runCommand(packageProgram(program), args, {
    cwd: ROOT,
    env: { ...env, TZ: zone, TEST_TZ: zone },
    timeout: TIMEOUT_MS,
  });
  const found = existsSync(report) ? JSON.parse(readFileSync(report, 'utf8')) : null;
  return {
    name: suite.name,
    totals: vitestTotals(found, code),
    output: lastLines(`${output}\n${errors}`, SHOWN_LINES),
    seconds: (performance.now() - began) / 1000,
  };
}
