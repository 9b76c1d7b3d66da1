import { SetupFailure } from './failure.mjs';

/** @param {number} since milliseconds of the monotonic clock */
function seconds(since) {
  return `${((performance.now() - since) / 1000).toFixed(1)} s`;
}

/** Whether a step's line still waits for its outcome. */
let lineIsOpen = false;

/** Prints a line for people, also while a step is under way. @param {string} text */
export function say(text) {
  process.stdout.write(`${lineIsOpen ? '\n' : ''}${text}\n`);
  lineIsOpen = false;
}

/** @param {string} outcome @param {number} began */
function close(outcome, began) {
  process.stdout.write(`${lineIsOpen ? '' : '  '}${outcome} (${seconds(began)})\n`);
  lineIsOpen = false;
}

/** @param {string} text */
const indent = (text) => text.replaceAll('\n', '\n  ');

/**
 * Does one step and tells what it does, what came of it and how long it took.
 * @template T
 * @param {string} title what is done
 * @param {(tell: (outcome: string) => void) => Promise<T> | T} work `tell` sets the outcome's words; empty is "done"
 * @returns {Promise<T>}
 */
export async function step(title, work) {
  const began = performance.now();
  let outcome = 'done';
  process.stdout.write(`· ${title} … `);
  lineIsOpen = true;
  try {
    const result = await work((words) => (outcome = words));
    close(outcome, began);
    return result;
  } catch (error) {
    close('failed', began);
    throw error;
  }
}

/**
 * What a person reads when a step has failed: what was done, why it failed, what to type. No stack for what is expected.
 * @param {unknown} error
 */
export function explain(error) {
  if (!(error instanceof SetupFailure)) {
    return error instanceof Error ? (error.stack ?? error.message) : String(error);
  }
  if (!error.did) return error.why;
  const lines = [`What was done: ${indent(error.did)}`, `Why it failed: ${indent(error.why)}`];
  if (error.type) lines.push(`What to type:  ${error.type}`);
  return lines.join('\n');
}
