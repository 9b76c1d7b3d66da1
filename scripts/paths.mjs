import { fileURLToPath } from 'node:url';
import { join, resolve } from 'node:path';

/** The project's own folder. */
export const ROOT = fileURLToPath(new URL('..', import.meta.url)).replace(/\/$/, '');

/** Where `npm start` keeps its data: PLIMSOLL_DATA, or .plimsoll in the project. */
export const dataFolder = () => resolve(ROOT, process.env['PLIMSOLL_DATA'] || '.plimsoll');

/** Where `npm test` and the specs keep their throw-away clusters. */
export const testFolder = () => join(ROOT, '.plimsoll-test');

/**
 * A program that the packages bring.
 * @param {string} name
 */
export const packageProgram = (name) => join(ROOT, 'node_modules', '.bin', name);
