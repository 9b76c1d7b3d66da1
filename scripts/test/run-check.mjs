import { runCommand } from '../command.mjs';
import { explain } from '../steps.mjs';
import { packageProgram, ROOT } from '../paths.mjs';

const TIMEOUT_MS = 600_000;

/**
 * @typedef {object} Outcome
 * @property {string} name
 * @property {import('./totals.mjs').Totals} totals
 * @property {string} output shown when something failed
 * @property {number} seconds
 */

/**
 * @param {string} name
 * @param {() => Promise<{ ok: boolean, output: string }>} work
 * @returns {Promise<Outcome>}
 */
async function judge(name, work) {
  const began = performance.now();
  const { ok, output } = await work();
  const seconds = (performance.now() - began) / 1000;
  return { name, totals: { passed: ok ? 1 : 0, failed: ok ? 0 : 1 }, output, seconds };
}

/**
 * @param {import('./suites.mjs').Check} check
 * @param {NodeJS.ProcessEnv} env
 */
export function runCheck({ name, program, args }, env) {
  return judge(name, async () => {
    const options = { cwd: ROOT, env, timeout: TIMEOUT_MS };
    const { code, output, errors } = await runCommand(packageProgram(program), args, options);
    return { ok: code === 0, output: `${output}\n${errors}` };
  });
}

/**
 * A build counts as a check too.
 * @param {string} name
 * @param {() => Promise<unknown>} build
 */
export function runBuild(name, build) {
  return judge(name, () =>
    build().then(
      () => ({ ok: true, output: '' }),
      (error) => ({ ok: false, output: explain(error) }),
    ),
  );
}
