/**
 * Everything that `npm test` runs. A check is one test: it passes or fails as a whole.
 * @typedef {object} Check
 * @property {string} name
 * @property {string} program of node_modules/.bin
 * @property {string[]} args
 */

/** @type {Check[]} */
export const CHECKS = [
  { name: 'lint', program: 'eslint', args: ['.'] },
  { name: 'format', program: 'prettier', args: ['--check', '.'] },
  {
    name: 'imports',
    program: 'depcruise',
    args: ['--config', '.dependency-cruiser.cjs', 'src', 'server', 'shared', 'emails', 'scripts'],
  },
  { name: 'unused', program: 'knip', args: [] },
  { name: 'types-client', program: 'ngc', args: ['-p', 'src/tsconfig.app.json', '--noEmit'] },
  { name: 'types-server', program: 'tsc', args: ['-p', 'server/tsconfig.json'] },
  { name: 'types-test', program: 'tsc', args: ['-p', 'test/tsconfig.json'] },
  { name: 'types-shared', program: 'tsc', args: ['-p', 'shared/tsconfig.json'] },
];

/**
 * @typedef {object} Suite
 * @property {string} name
 * @property {'vitest' | 'angular'} runner
 * @property {string} [project] of vitest.config.ts
 * @property {string} [zone] the time zone of the process; UTC unless said otherwise
 * @property {boolean} [database] whether it needs the throw-away cluster
 * @property {boolean} [browser] whether it drives Chromium, and so needs the built product
 */

/** @type {Suite[]} */
export const SUITES = [
  { name: 'shared', runner: 'vitest', project: 'shared' },
  { name: 'shared-west', runner: 'vitest', project: 'shared', zone: 'America/Los_Angeles' },
  { name: 'shared-east', runner: 'vitest', project: 'shared', zone: 'Pacific/Kiritimati' },
  { name: 'published', runner: 'vitest', project: 'published' },
  { name: 'server', runner: 'vitest', project: 'server', database: true },
  { name: 'client', runner: 'angular' },
  { name: 'e2e', runner: 'vitest', project: 'e2e', database: true, browser: true },
];

/**
 * Those whose name begins with one of the asked-for names; all when none is asked for.
 * @template {{ name: string }} T
 * @param {T[]} all
 * @param {string[]} asked
 */
export function choose(all, asked) {
  return all.filter(({ name }) => asked.length === 0 || asked.some((ask) => name.startsWith(ask)));
}
