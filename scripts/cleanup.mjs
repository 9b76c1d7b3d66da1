import { endCommands } from './command.mjs';
import { explain } from './steps.mjs';

/** What has been started and must be stopped again, the latest first. */
export class Cleanup {
  /** @type {Array<() => Promise<unknown> | unknown>} */
  #undo = [];
  /** @type {Promise<void> | null} */
  #done = null;

  /**
   * @param {() => Promise<unknown> | unknown} undo
   * @throws once the stopping has begun, so that nothing is started any more
   */
  add(undo) {
    if (this.#done) throw new Error('Nothing is started while everything is being stopped.');
    this.#undo.push(undo);
  }

  /** Whether the stopping has begun. */
  get begun() {
    return this.#done !== null;
  }

  /** Stops everything once, however often it is asked; a failure is told and does not keep the rest running. */
  run() {
    this.#done ??= this.#runAll();
    return this.#done;
  }

  async #runAll() {
    endCommands();
    for (const undo of this.#undo.reverse()) await attempt(undo);
  }
}

/** @param {() => Promise<unknown> | unknown} undo */
async function attempt(undo) {
  try {
    await undo();
  } catch (error) {
    console.error(explain(error));
  }
}

/** How often a process that npm started looks whether npm is still there, in milliseconds. */
const LOOK_MS = 500;

/**
 * Resolves with the reason when the person, or the machine, asks this process to end. A killed npm can pass nothing on:
 * then its child has another parent, and ends too.
 * @returns {Promise<string>}
 */
export function stopRequest() {
  return new Promise((resolve) => {
    for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => resolve(signal));
    if (!process.env['npm_lifecycle_event']) return;
    const parent = process.ppid;
    const look = setInterval(() => {
      if (process.ppid !== parent) resolve('the end of npm');
    }, LOOK_MS);
    look.unref();
  });
}
